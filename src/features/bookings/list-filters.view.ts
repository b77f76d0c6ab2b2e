import { bookingStates } from '#shared/domain/states.ts';
import { fromSiteInput } from '#src/lib/site-time.ts';

/** `live`: what still takes a place, which is what one mostly looks for. */
export const stateChoices = ['live', ...bookingStates, 'all'] as const;

export type ListFilters = {
  readonly state: (typeof stateChoices)[number];
  /** Calendar days at the site. */
  readonly from: string;
  readonly to: string;
  readonly tag: string;
  readonly atRisk: '' | 'true';
  readonly mine: '' | 'true';
  readonly sort: 'start' | 'newest';
};

/** The filters of the page as the endpoint takes them; what is not set is left out. */
export function listQuery(filters: ListFilters, zone: string) {
  const from = dayStart(filters.from, zone);
  const to = dayStart(filters.to, zone);
  const tag = filters.tag.trim().toUpperCase();
  return {
    sort: filters.sort,
    ...stateQuery(filters.state),
    ...(from === undefined ? {} : { from }),
    ...(to === undefined ? {} : { to }),
    ...(tag === '' ? {} : { tag }),
    ...(filters.atRisk === '' ? {} : { atRisk: filters.atRisk }),
    ...(filters.mine === '' ? {} : { mine: filters.mine }),
  };
}

function stateQuery(state: ListFilters['state']): { state?: string } {
  if (state === 'all') {
    return {};
  }
  return { state: state === 'live' ? 'tentative,confirmed,running' : state };
}

function dayStart(day: string, zone: string): string | undefined {
  const reading = fromSiteInput(day === '' ? '' : `${day}T00:00`, zone);
  return reading.kind === 'instant' ? reading.at : undefined;
}
