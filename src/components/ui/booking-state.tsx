import type { BookingState } from '#shared/domain/states.ts';
import { t } from '#src/texts/t.ts';
import type { MarkName, Tone } from './mark.tsx';
import { State } from './state.tsx';

const looks: Record<BookingState, { mark: MarkName; tone: Tone }> = {
  tentative: { mark: 'held', tone: 'heron' },
  confirmed: { mark: 'confirmed', tone: 'heron' },
  running: { mark: 'running', tone: 'reed' },
  done: { mark: 'done', tone: 'ink' },
  cancelled: { mark: 'cancelled', tone: 'ink' },
};

/** A booking's state with its mark; at risk goes before everything else. */
export function BookingStateWord(props: { state: BookingState; isAtRisk: boolean }) {
  if (props.isAtRisk) {
    return (
      <State mark="at-risk" tone="marigold">
        {t.ui.atRisk}
      </State>
    );
  }
  const { mark, tone } = looks[props.state];
  return (
    <State mark={mark} tone={tone}>
      {t.ui.bookingStates[props.state]}
    </State>
  );
}
