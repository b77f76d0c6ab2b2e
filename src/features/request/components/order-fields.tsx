import { useQuery } from '@tanstack/react-query';
import { Field } from '#src/components/ui/field.tsx';
import { DateTimeInput, TextArea } from '#src/components/ui/input.tsx';
import { Select } from '#src/components/ui/select.tsx';
import { Tick } from '#src/components/ui/tick.tsx';
import { useSite } from '#src/hooks/use-site.ts';
import { t } from '#src/texts/t.ts';
import { projectsQuery } from '../api/request-queries.ts';
import type { AimProps } from './aim-fields.tsx';

const words = t.request;

/** For whom and by when. */
export function OrderFields({ draft, errorOf, onChange }: AimProps) {
  const site = useSite();
  const projects = useQuery(projectsQuery(site.code));
  const own = projects.data?.items.filter((project) => project.isMember) ?? [];
  const time = (label: string, pointer: string, key: 'earliestStart' | 'neededBy') => (
    <Field label={label} help={words.zone(site.zone)} error={errorOf(pointer)} optional>
      <DateTimeInput
        value={draft[key]}
        step={900}
        onChange={(event) => {
          onChange({ [key]: event.target.value });
        }}
      />
    </Field>
  );
  return (
    <div className="max-w-[560px]">
      <Field label={words.project} error={errorOf('#/projectId')}>
        <Select
          value={draft.projectId}
          options={own.map((project) => ({ value: String(project.id), label: project.name }))}
          onChange={(event) => {
            onChange({ projectId: event.target.value });
          }}
        />
      </Field>
      {time(words.earliest, '#/earliestStartAt', 'earliestStart')}
      {time(words.neededBy, '#/neededByAt', 'neededBy')}
      <Field label={words.note} error={errorOf('#/note')} optional>
        <TextArea
          value={draft.note}
          onChange={(event) => {
            onChange({ note: event.target.value });
          }}
        />
      </Field>
      <Tick
        checked={draft.maySplit}
        onChange={(event) => {
          onChange({ maySplit: event.target.checked });
        }}
      >
        {words.maySplit}
      </Tick>
    </div>
  );
}
