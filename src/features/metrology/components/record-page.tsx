import { useQuery } from '@tanstack/react-query';
import { Page, Section } from '#src/components/layout/page.tsx';
import { ErrorState, Loading } from '#src/components/ui/feedback.tsx';
import { Field } from '#src/components/ui/field.tsx';
import { TextInput } from '#src/components/ui/input.tsx';
import { Notice } from '#src/components/ui/notice.tsx';
import { useSite } from '#src/hooks/use-site.ts';
import { useUrlState } from '#src/hooks/use-url-state.ts';
import { tableError } from '#src/lib/table-error.ts';
import { t } from '#src/texts/t.ts';
import { dutyOfQuery, instrumentQuery } from '../api/calibration-queries.ts';
import { RecordForm } from './record-form.tsx';

const words = t.metrology;

function ForInstrument(props: { tag: string; replacesId: number | null }) {
  const site = useSite();
  const instrument = useQuery(instrumentQuery(site.code, props.tag));
  const duties = useQuery(dutyOfQuery(site.code, props.tag));
  const failure = tableError(instrument);
  if (props.tag === '' || instrument.fetchStatus === 'idle') {
    if (instrument.data === undefined && failure === undefined) {
      return null;
    }
  }
  if (failure !== undefined) {
    return <ErrorState {...failure} />;
  }
  if (instrument.data === undefined || duties.isPending) {
    return <Loading what={props.tag} />;
  }
  const duty = duties.data?.items.find((row) => row.tag === props.tag);
  return (
    <RecordForm
      key={instrument.data.tag}
      instrument={instrument.data}
      intervalMonths={duty?.intervalMonths ?? null}
      replacesId={props.replacesId}
    />
  );
}

/** Records one calibration: the instrument first, then what its certificate says. */
export function RecordPage() {
  const [tag, setTag] = useUrlState('tag');
  const [replaces] = useUrlState('replaces');
  const replacesId = /^\d+$/.test(replaces) ? Number(replaces) : null;
  return (
    <Page
      title={words.newTitle}
      intro={<p>{words.newIntro}</p>}
      notice={
        replacesId === null ? null : <Notice kind="info">{words.correcting(replacesId)}</Notice>
      }
    >
      <Section title={words.instrument}>
        <div className="max-w-[560px]">
          <Field label={words.instrument} help={words.instrumentHelp}>
            <TextInput
              value={tag}
              maxLength={4}
              autoFocus={tag === ''}
              onChange={(event) => {
                setTag(event.target.value.trim().toUpperCase());
              }}
            />
          </Field>
        </div>
      </Section>
      <ForInstrument tag={tag} replacesId={replacesId} />
    </Page>
  );
}
