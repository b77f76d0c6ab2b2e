import type { BoardBar as Bar } from '#shared/contracts/board.contract.ts';
import { barPhases } from '#src/components/drawing/booking-bar.view.ts';
import { PhaseBar, type BarTone } from '#src/components/drawing/phase-bar.tsx';
import { Mark } from '#src/components/ui/mark.tsx';
import { wordsAfter, type BarName, type WordsAfter } from '../board-bar.view.ts';

function toneOf(bar: Bar): BarTone {
  if (bar.isAtRisk) {
    return 'at-risk';
  }
  return bar.state === 'done' || bar.state === 'cancelled' ? 'finished' : 'heron';
}

function riskFromSeconds(bar: Bar): number | undefined {
  if (!bar.isAtRisk) {
    return undefined;
  }
  const fromMs = bar.atRiskFrom === null ? 0 : Date.parse(bar.atRiskFrom);
  return Math.max(0, (fromMs - Date.parse(bar.startAt)) / 1000);
}

function After({ after }: { after: WordsAfter }) {
  return (
    <span className="mp-board-after">
      {after.risk === '' ? null : (
        <b className="mp-board-risk">
          <Mark name="at-risk" tone="marigold" /> {after.risk}
        </b>
      )}
      {after.number === '' ? null : <b className="mp-board-number">{after.number}</b>}
      {after.words === '' ? null : <span>{after.words}</span>}
    </span>
  );
}

/** One booking in one row: its whole drawing, shifted so that only what lies in the window shows. */
export function BoardBar(props: {
  bar: Bar;
  name: BarName;
  width: number;
  hiddenLeft: number;
  /** Pixels free behind it. */
  room: number;
}) {
  const { bar, name, width } = props;
  const after = wordsAfter(bar, name, width, props.room);
  const look = ['mp-board-bar', ...(bar.state === 'tentative' ? ['mp-board-tentative'] : [])];
  return (
    <>
      <span className={look.join(' ')}>
        <span style={{ marginLeft: -props.hiddenLeft }}>
          <PhaseBar
            phases={barPhases(bar.phases, bar.holdLikelyEndAt)}
            width={width}
            tone={toneOf(bar)}
            number={name.number === '' ? undefined : name.number}
            words={name.words}
            riskFromSeconds={riskFromSeconds(bar)}
          />
        </span>
      </span>
      {after === undefined ? null : <After after={after} />}
    </>
  );
}
