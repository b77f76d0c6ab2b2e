import { useQuery } from '@tanstack/react-query';
import { requestKinds, requestStates } from '#shared/domain/states.ts';
import { Filters } from '#src/components/ui/filters.tsx';
import { DateInput, TextInput } from '#src/components/ui/input.tsx';
import { Select, type SelectOption } from '#src/components/ui/select.tsx';
import { Tick } from '#src/components/ui/tick.tsx';
import { useSite } from '#src/hooks/use-site.ts';
import { useClearUrlState, useUrlChoice, useUrlState } from '#src/hooks/use-url-state.ts';
import { t } from '#src/texts/t.ts';
import { projectsQuery } from '../api/requests-queries.ts';
import { flagChoices, kindChoices, requestSorts, stateChoices } from '../list-filters.view.ts';

/** Every filter lives in the URL, so that a list can be sent to somebody as a link. */
export function useRequestFilters() {
  const [state, setState] = useUrlChoice('state', stateChoices, 'open');
  const [kind, setKind] = useUrlChoice('kind', kindChoices, '');
  const [project, setProject] = useUrlState('project');
  const [mine, setMine] = useUrlChoice('mine', flagChoices, '');
  const [text, setText] = useUrlState('text');
  const [neededBefore, setNeededBefore] = useUrlState('neededBefore');
  const [sort, setSort] = useUrlChoice('sort', requestSorts, 'needed-by');
  const clear = useClearUrlState(['state', 'kind', 'project', 'mine', 'text', 'neededBefore']);
  const isSet =
    state !== 'open' || [kind, project, mine, text, neededBefore].some((value) => value !== '');
  return {
    values: { state, kind, project, mine, text, neededBefore, sort },
    set: { setState, setKind, setProject, setMine, setText, setNeededBefore, setSort },
    clear: isSet ? clear : undefined,
  };
}

function SelectFilter(props: {
  label: string;
  value: string;
  emptyLabel: string | null;
  options: readonly SelectOption[];
  onChange: (value: string) => void;
}) {
  return (
    <label>
      <span className="mp-note">{props.label}</span>
      <Select
        value={props.value}
        emptyLabel={props.emptyLabel}
        options={props.options}
        onChange={(event) => {
          props.onChange(event.target.value);
        }}
      />
    </label>
  );
}

export function RequestsFilters({ values, set, clear }: ReturnType<typeof useRequestFilters>) {
  const site = useSite();
  const projects = useQuery(projectsQuery(site.code));
  const words = t.requests.list;
  return (
    <Filters onClear={clear}>
      <SelectFilter
        label={words.filters.state}
        value={values.state}
        emptyLabel={null}
        options={[
          { value: 'open', label: words.open },
          ...requestStates.map((value) => ({ value, label: t.requests.states[value] })),
          { value: 'all', label: words.all },
        ]}
        onChange={(value) => {
          set.setState(stateChoices.find((each) => each === value) ?? 'open');
        }}
      />
      <SelectFilter
        label={words.filters.kind}
        value={values.kind}
        emptyLabel={words.all}
        options={requestKinds.map((value) => ({ value, label: t.requests.kinds[value] }))}
        onChange={(value) => {
          set.setKind(kindChoices.find((each) => each === value) ?? '');
        }}
      />
      <SelectFilter
        label={words.filters.project}
        value={values.project}
        emptyLabel={words.all}
        options={(projects.data?.items ?? []).map((project) => ({
          value: String(project.id),
          label: project.name,
        }))}
        onChange={set.setProject}
      />
      <label>
        <span className="mp-note">{words.filters.neededBefore}</span>
        <DateInput
          value={values.neededBefore}
          onChange={(event) => {
            set.setNeededBefore(event.target.value);
          }}
        />
      </label>
      <label>
        <span className="mp-note">{words.filters.text}</span>
        <TextInput
          type="search"
          maxLength={80}
          value={values.text}
          onChange={(event) => {
            set.setText(event.target.value);
          }}
        />
      </label>
      <SelectFilter
        label={t.ui.order}
        value={values.sort}
        emptyLabel={null}
        options={requestSorts.map((value) => ({ value, label: words.sorts[value] }))}
        onChange={(value) => {
          set.setSort(requestSorts.find((each) => each === value) ?? 'needed-by');
        }}
      />
      <Tick
        checked={values.mine === 'true'}
        onChange={(event) => {
          set.setMine(event.target.checked ? 'true' : '');
        }}
      >
        {words.filters.mine}
      </Tick>
    </Filters>
  );
}
