import type { Today } from '#shared/contracts/board.contract.ts';

const waits: Record<Today['waits'][number]['kind'], string> = {
  proposal: 'proposed slot',
  request: 'request',
  'at-risk': 'at risk',
  'second-signature': 'second signature',
  release: 'release',
  draft: 'draft',
  booking: 'booking',
  deviation: 'deviation',
};

export const today = {
  title: 'Today',
  staffed: (site: string, hours: string) => `${site}, staffed ${hours}`,
  nobody: (site: string) => `${site}, nobody is planned to work`,
  day: 'The day',
  dayNote: 'As planned, not as measured. Millpond is no alarm.',
  doors: { load: 'load', unload: 'unload' },
  door: (chamber: string, what: string) => `${chamber} ${what}`,
  happeningColumns: {
    time: 'Time',
    what: 'What happens',
    touches: 'Touches',
    state: 'State',
    act: '',
  },
  earlierToday: (count: number) => `Show ${count} earlier today`,
  nothing: 'Nothing is planned for today.',
  open: 'Open',
  actions: 'What to do',
  waits: 'Waits for you',
  waitsNote: 'Oldest first. Nothing here is hidden by a filter.',
  waitColumns: {
    kind: 'Kind',
    what: 'What is asked',
    why: 'Why it matters',
    since: 'Since',
    act: '',
  },
  noWaits: 'Nothing waits for you.',
  moreWaits: (count: number) => `Show ${count} more`,
  kinds: waits,
  due: 'Falls due',
  dueNote: 'Eight weeks. Blue: bookings. Upright: due. Shaded: not bookable.',
  dueColumns: { instrument: 'Instrument', due: 'Due', weeks: 'Weeks', past: 'Bookings past due' },
  noDue: 'Nothing falls due in the next eight weeks.',
  past: (count: number, atRisk: number) =>
    count === 0 ? 'none' : atRisk === 0 ? `${count} after` : `${atRisk} at risk, ${count} after`,
  weeksOf: (tag: string, due: string) => `${tag}: due ${due}`,
  tide: (taken: number, positions: number) => `${taken} of ${positions} positions`,
} as const;
