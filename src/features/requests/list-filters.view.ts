import { requestSorts } from '#shared/contracts/requests.contract.ts';
import { requestKinds, requestStates, type RequestState } from '#shared/domain/states.ts';
import { t } from '#src/texts/t.ts';

/** `open`: what still wants something done, which is what one mostly looks for. */
export const stateChoices = ['open', ...requestStates, 'all'] as const;
export const kindChoices = ['', ...requestKinds] as const;
export const flagChoices = ['', 'true'] as const;
export { requestSorts };

const openStates: readonly RequestState[] = ['draft', 'submitted', 'partly-booked', 'booked'];

export type ListFilters = {
  readonly state: (typeof stateChoices)[number];
  readonly kind: (typeof kindChoices)[number];
  /** A project number as the URL has it. */
  readonly project: string;
  readonly mine: '' | 'true';
  readonly text: string;
  /** A calendar day at the site. */
  readonly neededBefore: string;
  readonly sort: (typeof requestSorts)[number];
};

/** The filters of the page as the endpoint takes them; what is not set is left out. */
export function listQuery(filters: ListFilters) {
  const { kind, mine, neededBefore } = filters;
  const text = filters.text.trim();
  return {
    sort: filters.sort,
    ...stateQuery(filters.state),
    ...(kind === '' ? {} : { kind }),
    ...(/^[1-9]\d{0,8}$/.test(filters.project) ? { projectId: Number(filters.project) } : {}),
    ...(mine === '' ? {} : { mine }),
    ...(text === '' ? {} : { text: text.slice(0, 80) }),
    ...(/^\d{4}-\d{2}-\d{2}$/.test(neededBefore) ? { neededBefore } : {}),
  };
}

function stateQuery(state: ListFilters['state']): { state?: string } {
  if (state === 'all') {
    return {};
  }
  return { state: state === 'open' ? openStates.join(',') : state };
}

/** `6 × NP35`, `9 cells: NP35, RC21`; a draft may know neither. */
export function cellsWords(row: {
  readonly cellCount: number;
  readonly cellTypeNames: readonly string[];
}): string {
  const words = t.requests.list;
  const [first] = row.cellTypeNames;
  if (first === undefined) {
    return words.noCells;
  }
  return row.cellTypeNames.length === 1
    ? words.cells(row.cellCount, first)
    : words.mixedCells(row.cellCount, row.cellTypeNames.join(', '));
}
