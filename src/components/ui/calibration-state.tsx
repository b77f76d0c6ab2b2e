import type { CalibrationBadge } from '#shared/domain/states.ts';
import { t } from '#src/texts/t.ts';
import type { MarkName, Tone } from './mark.tsx';
import { Mark } from './mark.tsx';
import { State } from './state.tsx';

const looks: Record<CalibrationBadge, { mark: MarkName; tone: Tone }> = {
  'in-date': { mark: 'in-date', tone: 'reed' },
  'due-soon': { mark: 'due-soon', tone: 'marigold' },
  overdue: { mark: 'overdue', tone: 'brick' },
  limited: { mark: 'limited', tone: 'marigold' },
  'awaiting-release': { mark: 'locked', tone: 'brick' },
  'out-of-service': { mark: 'out-of-service', tone: 'ink' },
  'not-calibrated': { mark: 'overdue', tone: 'brick' },
};

/** The calibration state with its mark and word, everywhere the same. */
export function CalibrationState(props: { badge: CalibrationBadge | null }) {
  if (props.badge === null) {
    return <span className="mp-note">{t.ui.notToCalibrate}</span>;
  }
  const { mark, tone } = looks[props.badge];
  return (
    <State mark={mark} tone={tone}>
      {t.ui.badges[props.badge]}
    </State>
  );
}

/** Only the mark, where the row is too narrow; its word is read out. */
export function CalibrationMark(props: { badge: CalibrationBadge }) {
  const { mark, tone } = looks[props.badge];
  return (
    <span title={t.ui.badges[props.badge]}>
      <Mark name={mark} tone={tone} />
      <span className="mp-hidden">{t.ui.badges[props.badge]}</span>
    </span>
  );
}
