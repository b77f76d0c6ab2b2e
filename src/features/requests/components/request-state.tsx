import type { RequestState } from '#shared/domain/states.ts';
import type { MarkName, Tone } from '#src/components/ui/mark.tsx';
import { State } from '#src/components/ui/state.tsx';
import { t } from '#src/texts/t.ts';

const looks: Record<RequestState, { mark: MarkName; tone: Tone }> = {
  draft: { mark: 'draft', tone: 'ink' },
  submitted: { mark: 'asked', tone: 'heron' },
  'partly-booked': { mark: 'offered', tone: 'heron' },
  booked: { mark: 'booked', tone: 'reed' },
  done: { mark: 'answered', tone: 'reed' },
  withdrawn: { mark: 'withdrawn', tone: 'ink' },
};

/** The bead on its staff, and the word. */
export function RequestStateWord(props: { state: RequestState }) {
  const { mark, tone } = looks[props.state];
  return (
    <State mark={mark} tone={tone}>
      {t.requests.states[props.state]}
    </State>
  );
}
