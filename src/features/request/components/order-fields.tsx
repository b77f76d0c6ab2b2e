import { useQuery } from '@tanstack/react-query';
import { Field } from '#src/components/ui/field.tsx';
import { ErrorState } from '#src/components/ui/feedback.tsx';
import { DateTimeInput, TextArea } from '#src/components/ui/input.tsx';
import { Select } from '#src/components/ui/select.tsx';
import { Tick } from '#src/components/ui/tick.tsx';
import { useSite } from '#src/hooks/use-site.ts';
import { tableError } from '#src/lib/table-error.ts';
import { t } from '#src/texts/t.ts';
import { projectsQuery } from '../api/request-queries.ts';
import type { AimProps } from './aim-fields.tsx';

const words = t.request;

function ProjectField({ draft, errorOf, onChange }: AimProps) {
  const site = useSite();
  const projects = useQuery(projectsQuery(site.code));
  const failure = tableError(projects);
  const own = projects.data?.items.filter((project) => project.isMember) ?? [];
  return (
    <>
      {failure === undefined ? null : <ErrorState {...failure} />}
      <Field
        label={words.project}
        error={errorOf('#/projectId')}
        help={projects.isSuccess && own.length === 0 ? words.noProject : undefined}
      >
        <Select
          value={draft.projectId}
          options={own.map((project) => ({ value: String(project.id), label: project.name }))}
          onChange={(event) => {
            onChange({ projectId: event.target.value });
          }}
        />
      </Field>
    </>
  );
}

/** For whom and by when. Of a booked request only the day and the note can change. */
export function OrderFields(props: AimProps & { isBooked: boolean }) {
  const { draft, errorOf, onChange, isBooked } = props;
  const site = useSite();
  const time = (label: string, pointer: string, key: 'earliestStart' | 'neededBy') => (
    <Field label={label} help={words.zone(site.zone)} error={errorOf(pointer)} optional>
      <DateTimeInput
        value={draft[key]}
        onChange={(event) => {
          onChange({ [key]: event.target.value });
        }}
      />
    </Field>
  );
  return (
    <div className="max-w-[560px]">
      {isBooked ? null : <ProjectField {...props} />}
      {isBooked ? null : time(words.earliest, '#/earliestStartAt', 'earliestStart')}
      {time(words.neededBy, '#/neededByAt', 'neededBy')}
      <Field label={words.note} error={errorOf('#/note')} optional>
        <TextArea
          value={draft.note}
          maxLength={2000}
          onChange={(event) => {
            onChange({ note: event.target.value });
          }}
        />
      </Field>
      {isBooked ? null : (
        <Tick
          checked={draft.maySplit}
          onChange={(event) => {
            onChange({ maySplit: event.target.checked });
          }}
        >
          {words.maySplit}
        </Tick>
      )}
    </div>
  );
}
