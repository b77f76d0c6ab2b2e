import type { Grade, Priority, RequestState } from '#shared/domain/states.ts';

export type OpenRequestPlan = {
  readonly project: string;
  readonly type: string;
  readonly count: number;
  readonly chargePct: number | null;
  readonly setC: number;
  readonly grade?: Grade;
  readonly priority?: Priority;
  readonly state?: RequestState;
  /** Settled to this share, to this many amperes, or a screening by this ratio. */
  readonly settled?: number;
  readonly settledA?: number;
  readonly screening?: number;
  readonly note?: string;
  readonly daysAgo: number;
  readonly neededInDays: number | null;
  readonly restDays?: number;
  readonly cells: 'in-house' | 'announced' | 'quarantined' | 'unnamed';
  readonly maySplit?: boolean;
  readonly declineReason?: string;
  /** A deviation asked, granted or refused on it. */
  readonly deviation?: 'asked' | 'granted' | 'refused';
  readonly hasProposal?: boolean;
};

const usual = { chargePct: 50, settled: 0.1, cells: 'in-house' } as const;

/** Requests that still wait. Most find a slot; the note of the others tells what stands in the way. */
export const openRequestPlans: readonly OpenRequestPlan[] = [
  { ...usual, project: 'HEDGE', type: 'CY50', count: 6, setC: 25, daysAgo: 8, neededInDays: 21 },
  {
    ...usual,
    project: 'HEDGE',
    type: 'CY48',
    count: 4,
    setC: 45,
    daysAgo: 7,
    neededInDays: 24,
    priority: 'high',
  },
  {
    project: 'HEDGE',
    type: 'CY34',
    count: 8,
    chargePct: 40,
    screening: 3,
    cells: 'in-house',
    setC: 25,
    daysAgo: 6,
    neededInDays: 18,
    note: 'Eight cells of the drop test; a quick sort is enough.',
    maySplit: true,
  },
  { ...usual, project: 'SILT', type: 'CY25', count: 6, setC: 60, daysAgo: 6, neededInDays: 30 },
  {
    ...usual,
    project: 'SILT',
    type: 'PX20',
    count: 4,
    setC: 25,
    daysAgo: 5,
    neededInDays: 20,
    hasProposal: true,
  },
  { ...usual, project: 'WREN', type: 'PX12T', count: 4, setC: 25, daysAgo: 5, neededInDays: 26 },
  {
    ...usual,
    project: 'WREN',
    type: 'PX05',
    count: 3,
    setC: 45,
    daysAgo: 4,
    neededInDays: 14,
    grade: 'indicative',
  },
  {
    ...usual,
    project: 'WREN',
    type: 'CX45',
    count: 6,
    setC: 25,
    settled: 0.2,
    daysAgo: 4,
    neededInDays: 33,
  },
  { ...usual, project: 'DRUM', type: 'CL23', count: 2, setC: 25, daysAgo: 4, neededInDays: 17 },
  { ...usual, project: 'ANVIL', type: 'NP35', count: 2, setC: 45, daysAgo: 3, neededInDays: 28 },
  {
    ...usual,
    project: 'BEACON',
    type: 'LF280',
    count: 2,
    chargePct: 22,
    setC: 25,
    daysAgo: 3,
    neededInDays: 35,
    hasProposal: true,
    note: 'Held below the plateau on purpose.',
  },
  {
    ...usual,
    project: 'HEDGE',
    type: 'CY50',
    count: 8,
    setC: 25,
    daysAgo: 2,
    neededInDays: 30,
    cells: 'announced',
    maySplit: true,
    note: 'The cells come with the next delivery.',
  },
  {
    ...usual,
    project: 'SILT',
    type: 'CY35',
    count: 4,
    setC: 25,
    daysAgo: 1,
    neededInDays: 10,
    restDays: 0.3,
    note: 'Charged this week.',
  },
  {
    ...usual,
    project: 'HEDGE',
    type: 'CY34',
    count: 4,
    setC: 50,
    daysAgo: 6,
    neededInDays: 25,
    deviation: 'asked',
    note: 'The customer stores at 50 °C and wants that figure.',
  },
  {
    ...usual,
    project: 'BEACON',
    type: 'NP200',
    count: 8,
    setC: 25,
    daysAgo: 5,
    neededInDays: 40,
    note: 'All eight in one load, please.',
  },
  {
    ...usual,
    project: 'BEACON',
    type: 'LF280',
    count: 2,
    chargePct: 50,
    settled: 0.02,
    setC: 25,
    daysAgo: 3,
    neededInDays: 40,
    note: 'At 50 %, as the modules are shipped.',
  },
  {
    ...usual,
    project: 'WREN',
    type: 'CX20',
    count: 4,
    setC: 25,
    settledA: 1.5e-11,
    daysAgo: 2,
    neededInDays: 30,
    note: 'As fine as it goes.',
  },
  {
    ...usual,
    project: 'SILT',
    type: 'CY35',
    count: 3,
    setC: 25,
    daysAgo: 2,
    neededInDays: 12,
    cells: 'quarantined',
    note: 'Dented at the positive end; is it the dent that leaks?',
  },
  {
    ...usual,
    project: 'ANVIL',
    type: 'NP12',
    count: 3,
    setC: 35,
    daysAgo: 1,
    neededInDays: null,
    state: 'draft',
    declineReason: 'C07 is full that week; please say whether 25 °C would do.',
  },
  {
    project: 'DRUM',
    type: 'CL20',
    count: 2,
    chargePct: null,
    settled: 0.1,
    cells: 'unnamed',
    setC: 25,
    daysAgo: 0.4,
    neededInDays: null,
    state: 'draft',
  },
  { ...usual, project: 'MAPLE', type: 'CY50', count: 6, setC: 25, daysAgo: 6, neededInDays: 19 },
  {
    project: 'MAPLE',
    type: 'CY25',
    count: 5,
    chargePct: 30,
    screening: 4,
    cells: 'in-house',
    setC: 45,
    daysAgo: 4,
    neededInDays: 22,
  },
  {
    ...usual,
    project: 'FERRY',
    type: 'NP35',
    count: 2,
    setC: 25,
    daysAgo: 4,
    neededInDays: 30,
    deviation: 'granted',
  },
  {
    ...usual,
    project: 'FERRY',
    type: 'CL23',
    count: 4,
    setC: 25,
    daysAgo: 3,
    neededInDays: 28,
    note: 'Only C14 takes 4680 here.',
  },
];
