import { formatDuration } from '#src/lib/format-duration.ts';
import { t } from '#src/texts/t.ts';
import type { SettlingData, SettlingLayout } from './settling-chart.view.ts';

type Upright = { seconds: number; word: string; dash: string | undefined };

/** Where the current is likely and safely settled: full uprights with their lengths. */
export function SettlingUprights(props: {
  layout: SettlingLayout;
  target: SettlingData['target'];
  likelySeconds: number | undefined;
  safeSeconds: number | undefined;
}) {
  const { frame, x, y } = props.layout;
  const head = props.target === undefined ? frame.top : y(props.target.lowA);
  const uprights: Upright[] = [];
  if (props.likelySeconds !== undefined) {
    uprights.push({ seconds: props.likelySeconds, word: t.drawings.likely, dash: undefined });
  }
  if (props.safeSeconds !== undefined) {
    uprights.push({ seconds: props.safeSeconds, word: t.drawings.safe, dash: '4 3' });
  }
  const [first, second] = uprights.map((upright) => x(upright.seconds));
  const isTight = first !== undefined && second !== undefined && second - first < 84;
  return uprights.map((upright, index) => {
    const at = x(upright.seconds);
    // The earlier one steps to the left of its line where both would collide, or near the edge.
    const isLeft = (isTight && index === 0) || at + 84 > frame.right;
    const textX = isLeft ? at - 7 : at + 7;
    const anchor = isLeft ? 'end' : 'start';
    return (
      <g key={upright.word}>
        <path
          d={`M${at} ${head}V${frame.base}`}
          stroke="var(--ink)"
          strokeWidth="1.5"
          strokeDasharray={upright.dash}
        />
        <circle cx={at} cy={head} r="3.5" fill="var(--ink)" />
        <text x={textX} y={frame.base - 26} textAnchor={anchor} className="mp-axis-head mp-halo">
          {upright.word}
        </text>
        <text x={textX} y={frame.base - 10} textAnchor={anchor} className="mp-axis-strong mp-halo">
          {formatDuration(upright.seconds)}
        </text>
      </g>
    );
  });
}
