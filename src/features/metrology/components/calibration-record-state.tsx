import type { CalibrationState as RecordState, Conformity } from '#shared/domain/states.ts';
import type { MarkName, Tone } from '#src/components/ui/mark.tsx';
import { State } from '#src/components/ui/state.tsx';
import { t } from '#src/texts/t.ts';

const looks: Record<RecordState, { mark: MarkName; tone: Tone }> = {
  draft: { mark: 'to-do', tone: 'ink' },
  'awaiting-approval': { mark: 'to-do', tone: 'marigold' },
  approved: { mark: 'pass', tone: 'reed' },
  refused: { mark: 'stop', tone: 'brick' },
  replaced: { mark: 'done', tone: 'ink' },
};

/** Where a record stands: only an approved one counts. */
export function RecordStateWord(props: { state: RecordState }) {
  const { mark, tone } = looks[props.state];
  return (
    <State mark={mark} tone={tone}>
      {t.metrology.states[props.state]}
    </State>
  );
}

const conformityLooks: Record<Conformity, { mark: MarkName; tone: Tone }> = {
  conforms: { mark: 'pass', tone: 'reed' },
  'does-not-conform': { mark: 'stop', tone: 'brick' },
  'not-stated': { mark: 'to-do', tone: 'ink' },
};

export function ConformityWord(props: { conformity: Conformity }) {
  const { mark, tone } = conformityLooks[props.conformity];
  return (
    <State mark={mark} tone={tone}>
      {t.metrology.conformities[props.conformity]}
    </State>
  );
}
