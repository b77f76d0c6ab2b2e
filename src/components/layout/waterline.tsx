import { useId } from 'react';
import { Link } from 'react-router-dom';
import { formatTemperature } from '#src/lib/format-quantity.ts';
import { t } from '#src/texts/t.ts';
import { countPositions, waterLevel, type Vessel } from './waterline.view.ts';

export type { Vessel } from './waterline.view.ts';

function Water(props: { vessel: Vessel }) {
  const hatchId = useId();
  const { vessel } = props;
  const { y, height } = waterLevel(vessel);
  const isStale = vessel.state === 'stale';
  return (
    <svg viewBox="0 0 92 22" preserveAspectRatio="none" aria-hidden="true">
      {isStale ? (
        <pattern
          id={hatchId}
          width="6"
          height="6"
          patternUnits="userSpaceOnUse"
          patternTransform="rotate(45)"
        >
          <path d="M0 0v6" stroke="var(--heron)" strokeWidth="1.6" />
        </pattern>
      ) : null}
      {vessel.state === 'out' ? (
        <path d="M2 21 90 2" stroke="var(--rule-2)" vectorEffect="non-scaling-stroke" />
      ) : (
        <>
          <rect
            className="mp-water"
            x="1"
            y={y}
            width="90"
            height={height}
            fill={isStale ? `url(#${hatchId})` : 'var(--heron-wash)'}
            opacity={isStale ? 0.55 : 1}
          />
          <rect className="mp-water" x="1" y={y - 1} width="90" height="2" fill="var(--heron)" />
        </>
      )}
      <path
        d="M.8 0v21.2H91.2V0"
        fill="none"
        stroke="var(--ink)"
        strokeWidth="1.3"
        vectorEffect="non-scaling-stroke"
      />
      <path
        d="M1 6.38h4M1 11.66h4M1 16.94h4"
        stroke="var(--ink)"
        vectorEffect="non-scaling-stroke"
        opacity=".55"
      />
    </svg>
  );
}

function endWord(vessel: Vessel): string {
  const words = {
    ok: `${vessel.taken}/${vessel.positions}`,
    stale: t.layout.stale,
    out: t.layout.out,
  };
  return words[vessel.state];
}

function temperatureWord(vessel: Vessel): string {
  if (vessel.why !== undefined) {
    return vessel.why;
  }
  return vessel.temperatureC === null ? '' : formatTemperature(vessel.temperatureC, 0);
}

/** One vessel per chamber: its level is the share of positions taken now. */
export function Waterline(props: { siteName: string; clock: string; vessels: readonly Vessel[] }) {
  const { taken, positions } = countPositions(props.vessels);
  return (
    <section className="mp-waterline" aria-label={t.layout.waterline(props.siteName)}>
      <div className="mp-waterline-caption">
        <b>{t.layout.waterlineHead(props.clock)}</b>
        {t.layout.waterlineTaken(taken, positions)}
      </div>
      <ul className={props.vessels.length > 12 ? 'mp-waterline-many' : undefined}>
        {props.vessels.map((vessel) => (
          <li key={vessel.tag}>
            <Link to={vessel.href} title={vessel.sentence}>
              <Water vessel={vessel} />
              <span className="mp-vessel-words">
                <span>
                  <b>{vessel.tag}</b> {temperatureWord(vessel)}
                </span>
                <span>{endWord(vessel)}</span>
              </span>
              <span className="mp-hidden">{vessel.sentence}</span>
            </Link>
          </li>
        ))}
      </ul>
    </section>
  );
}
