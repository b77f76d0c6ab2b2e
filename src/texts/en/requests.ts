import type { Grade, Priority, RequestKind, RequestState } from '#shared/domain/states.ts';

const states: Record<RequestState, string> = {
  draft: 'draft',
  submitted: 'submitted',
  'partly-booked': 'partly booked',
  booked: 'booked',
  done: 'done',
  withdrawn: 'withdrawn',
};
const kinds: Record<RequestKind, string> = { settled: 'settled value', screening: 'screening' };
const grades: Record<Grade, string> = { reported: 'reported', indicative: 'indicative' };
const priorities: Record<Priority, string> = { low: 'low', normal: 'normal', high: 'high' };

export const requests = {
  title: 'Requests',
  intro: 'What is asked of this site, and how far each request has got.',
  caption: 'Requests',
  states,
  kinds,
  grades,
  priorities,
  request: (id: number) => `Request ${id}`,
  timesIn: (zone: string) => `Times in ${zone}.`,
  newRequest: 'New request',
  list: {
    empty: 'No request fits these filters.',
    none: 'Nothing is asked yet.',
    open: 'not finished',
    all: 'All',
    filters: {
      state: 'State',
      kind: 'Result',
      project: 'Project',
      text: 'Number, cell type or person',
      neededBefore: 'Needed before',
      mine: 'Only mine',
    },
    sorts: {
      'needed-by': 'Needed first',
      newest: 'Newest first',
      oldest: 'Oldest first',
      number: 'By number',
    },
    columns: {
      id: 'Request',
      cells: 'Cells',
      kind: 'Result',
      temperature: 'At',
      project: 'Project',
      requester: 'Asked by',
      neededBy: 'Needed by',
      state: 'State',
      bookings: 'Bookings',
    },
    cells: (count: number, types: string) => `${count} × ${types}`,
    mixedCells: (count: number, types: string) => `${count} cells: ${types}`,
    noCells: 'no cells yet',
    slotWished: 'a slot is proposed',
    high: 'high priority',
    low: 'low priority',
    overdue: 'past',
  },
} as const;
