import { t } from '#src/texts/t.ts';
import { gaugeMarks, settlingTrace, waterLevelY } from '../sign-in.view.ts';

const drawnWidth = 2600;
const height = 380;

/** The page's foot: a trace settling to the level of the pond, on its gauge. */
export function SettlingPond() {
  const trace = settlingTrace(drawnWidth);
  return (
    <div className="mp-sign-in-water" aria-hidden="true">
      <svg className="mp-sign-in-pond overflow-hidden" height={height}>
        <path d={`${trace}V${height}H0z`} fill="var(--heron-wash)" />
        <path
          d={`M0 ${waterLevelY}H${drawnWidth}`}
          stroke="var(--heron-mid)"
          strokeDasharray="2 6"
        />
        <path d={trace} fill="none" stroke="var(--heron)" strokeWidth="2.5" />
      </svg>
      <svg className="mp-sign-in-gauge" width="14" height={height}>
        <path d={`M1 0V${height}`} stroke="var(--ink)" strokeWidth="2" />
        {gaugeMarks(height).map((mark) => (
          <path key={mark.y} d={`M1 ${mark.y}h${mark.length}`} stroke="var(--ink)" />
        ))}
      </svg>
      <span className="mp-sign-in-word mp-sign-in-match">{t.session.match}</span>
      <span className="mp-sign-in-word mp-sign-in-settled">{t.session.settled}</span>
    </div>
  );
}
