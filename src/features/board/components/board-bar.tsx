import type { BoardBar as Bar } from '#shared/contracts/board.contract.ts';
import { barPhases } from '#src/components/drawing/booking-bar.view.ts';
import { PhaseBar, type BarTone } from '#src/components/drawing/phase-bar.tsx';

function toneOf(bar: Bar): BarTone {
  if (bar.isAtRisk) {
    return 'at-risk';
  }
  return bar.state === 'done' || bar.state === 'cancelled' ? 'finished' : 'heron';
}

/** One booking in one row: its whole drawing, shifted so that only what lies in the window shows. */
export function BoardBar(props: { bar: Bar; width: number; hiddenLeft: number }) {
  const { bar } = props;
  const [number, ...words] = bar.title.split(' · ');
  const riskFrom =
    bar.atRiskFrom === null
      ? undefined
      : Math.max(0, (Date.parse(bar.atRiskFrom) - Date.parse(bar.startAt)) / 1000);
  return (
    <span
      className={bar.state === 'tentative' ? 'mp-board-bar mp-board-tentative' : 'mp-board-bar'}
    >
      <span style={{ marginLeft: -props.hiddenLeft }}>
        <PhaseBar
          phases={barPhases(bar.phases, bar.holdLikelyEndAt)}
          width={props.width}
          tone={toneOf(bar)}
          number={number}
          words={words.join(' · ')}
          riskFromSeconds={riskFrom ?? (bar.isAtRisk ? 0 : undefined)}
        />
      </span>
    </span>
  );
}
