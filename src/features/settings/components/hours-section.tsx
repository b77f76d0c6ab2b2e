import { useQuery } from '@tanstack/react-query';
import { useState } from 'react';
import {
  getWorkingHours,
  setWorkingHours,
  type WorkingHoursDto,
} from '#shared/contracts/settings.contract.ts';
import { findOffers } from '#shared/contracts/offers.contract.ts';
import { getBoard, getToday } from '#shared/contracts/board.contract.ts';
import { Section } from '#src/components/layout/page.tsx';
import { Button } from '#src/components/ui/button.tsx';
import { FactList } from '#src/components/ui/fact-list.tsx';
import { ErrorState, Loading } from '#src/components/ui/feedback.tsx';
import { Field } from '#src/components/ui/field.tsx';
import { TextInput } from '#src/components/ui/input.tsx';
import { Notice } from '#src/components/ui/notice.tsx';
import { useApiMutation } from '#src/hooks/use-api-mutation.ts';
import { useNow } from '#src/hooks/use-now.ts';
import { useMay, useSite } from '#src/hooks/use-site.ts';
import { errorText } from '#src/lib/error-text.ts';
import { formatDay, siteCalendar } from '#src/lib/format-date.ts';
import { tableError } from '#src/lib/table-error.ts';
import { t } from '#src/texts/t.ts';
import { workingHoursQuery } from '../api/settings-queries.ts';
import { readSpans, writeSpans } from '../hours.view.ts';
import { ExceptionRows, type ExceptionDraft } from './exception-rows.tsx';

const words = t.settings;

function shown(text: string): string {
  return text === '' ? words.closed : text;
}

/** Days that are over change nothing any more; they stay stored and are not shown. */
function useDaysAhead(): (entry: { readonly day: string }) => boolean {
  const site = useSite();
  const { today } = siteCalendar(useNow(), site.zone);
  return (entry) => entry.day === '' || entry.day >= today;
}

function Reading(props: { hours: WorkingHoursDto; onEdit: (() => void) | undefined }) {
  const { hours } = props;
  const ahead = hours.exceptions.filter(useDaysAhead());
  return (
    <>
      <FactList
        columns={2}
        facts={hours.weekly.map((spans, index) => ({
          name: words.weekdays[index] ?? '',
          value: <span className="font-mono">{shown(writeSpans(spans))}</span>,
        }))}
      />
      <h3 className="mt-4">{words.exceptions}</h3>
      {ahead.length === 0 ? (
        <p className="mp-note">{words.noExceptions}</p>
      ) : (
        <FactList
          columns={2}
          facts={ahead.map((entry) => ({
            name: formatDay(entry.day),
            value: `${shown(writeSpans(entry.hours))}, ${entry.reason}`,
          }))}
        />
      )}
      {props.onEdit === undefined ? null : (
        <div className="mp-acts mt-4">
          <Button onClick={props.onEdit}>{words.editHours}</Button>
        </div>
      )}
    </>
  );
}

type HoursDraft = { readonly week: readonly string[]; readonly days: readonly ExceptionDraft[] };

function draftOf(hours: WorkingHoursDto): HoursDraft {
  return {
    week: hours.weekly.map(writeSpans),
    days: hours.exceptions.map((entry) => ({
      day: entry.day,
      hours: writeSpans(entry.hours),
      reason: entry.reason,
    })),
  };
}

function useHoursForm(hours: WorkingHoursDto, onDone: () => void) {
  const site = useSite();
  const [draft, setDraft] = useState(() => draftOf(hours));
  const save = useApiMutation(setWorkingHours, {
    refreshes: [getWorkingHours, findOffers, getBoard, getToday],
    onDone,
  });
  const weekly = draft.week.map(readSpans);
  const exceptions = draft.days.map((entry) => ({ ...entry, hours: readSpans(entry.hours) }));
  const isWhole =
    weekly.every((spans) => spans !== null) &&
    exceptions.every(({ hours: spans }) => spans !== null);
  return {
    draft,
    setDraft,
    save,
    isWhole,
    send: () => {
      save.mutate({
        params: { site: site.code },
        body: {
          weekly: weekly.map((spans) => spans ?? []),
          exceptions: exceptions.map((entry) => ({ ...entry, hours: entry.hours ?? [] })),
          version: hours.version,
        },
      });
    },
  };
}

function Editing(props: { hours: WorkingHoursDto; onClose: (isSaved: boolean) => void }) {
  const form = useHoursForm(props.hours, () => {
    props.onClose(true);
  });
  const isAhead = useDaysAhead();
  const { draft, setDraft, save } = form;
  const failure = errorText(save.error);
  return (
    <>
      {draft.week.map((text, index) => (
        <Field
          key={words.weekdays[index]}
          label={words.weekdays[index]}
          help={index === 0 ? words.hoursHelp : undefined}
          error={readSpans(text) === null ? words.hoursFault : undefined}
        >
          <TextInput
            value={text}
            onChange={(event) => {
              setDraft({ ...draft, week: draft.week.with(index, event.target.value) });
            }}
          />
        </Field>
      ))}
      <h3 className="mt-4">{words.exceptions}</h3>
      <ExceptionRows
        rows={draft.days.filter(isAhead)}
        onChange={(days) => {
          const past = draft.days.filter((entry) => !isAhead(entry));
          setDraft({ ...draft, days: [...past, ...days] });
        }}
      />
      {failure === undefined ? null : (
        <Notice kind="stop" role="alert">
          {failure}
        </Notice>
      )}
      <div className="mp-acts mt-3">
        <Button
          kind="primary"
          busy={save.isPending}
          why={form.isWhole ? undefined : words.hoursFault}
          onClick={form.send}
        >
          {words.saveHours}
        </Button>
        <Button
          kind="link"
          onClick={() => {
            props.onClose(false);
          }}
        >
          {words.keep}
        </Button>
      </div>
    </>
  );
}

/** Working hours of the week and the days that differ; to read, and to change where allowed. */
export function HoursSection() {
  const site = useSite();
  const may = useMay();
  const query = useQuery(workingHoursQuery(site.code));
  const [stage, setStage] = useState<'reading' | 'editing' | 'saved'>('reading');
  const failure = tableError(query);
  const edit = () => {
    setStage('editing');
  };
  return (
    <Section title={words.hours} note={<p>{words.hoursNote(site.zone)}</p>}>
      {failure === undefined ? null : <ErrorState {...failure} />}
      {query.isPending ? <Loading what={words.hours} /> : null}
      {stage === 'saved' ? (
        <Notice kind="pass" role="status">
          {words.hoursSaved}
        </Notice>
      ) : null}
      {query.data === undefined ? null : stage === 'editing' ? (
        <Editing
          hours={query.data}
          onClose={(isSaved) => {
            setStage(isSaved ? 'saved' : 'reading');
          }}
        />
      ) : (
        <Reading hours={query.data} onEdit={may('policy.edit') ? edit : undefined} />
      )}
    </Section>
  );
}
