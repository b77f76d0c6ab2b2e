import type { BookingState, CalibrationBadge } from '#shared/domain/states.ts';

const badges: Record<CalibrationBadge, string> = {
  'in-date': 'in date',
  'due-soon': 'due soon',
  overdue: 'overdue',
  limited: 'limited',
  'awaiting-release': 'awaiting release',
  'out-of-service': 'out of service',
  'not-calibrated': 'not calibrated',
};

const bookingStates: Record<BookingState, string> = {
  tentative: 'tentative',
  confirmed: 'confirmed',
  running: 'running',
  done: 'finished',
  cancelled: 'cancelled',
};

export const ui = {
  bookingStates,
  atRisk: 'at risk',
  badges,
  notToCalibrate: 'nothing to calibrate',
  loading: 'Loading.',
  loadingWhat: (what: string) => `Loading ${what}.`,
  nothing: 'Nothing here yet.',
  showMore: 'Show more',
  showingOf: (shown: number, total: number) => `${shown} of ${total} shown`,
  showing: (shown: number) => `${shown} shown`,
  failedTitle: 'This could not be loaded.',
  retry: 'Try again',
  requestId: 'Request number for the log:',
  sortBy: (head: string) => `Sort by ${head}`,
  scrollable: (caption: string) => `${caption}, scrolls sideways`,
  cancel: 'Keep as it is',
  close: 'Close',
  optional: 'optional',
  choose: 'Choose one',
  fileDrop: 'Drop a file here or pick one.',
  fileMany: 'Drop files here or pick them.',
  fileTypes: (types: string) => `Accepted: ${types}.`,
  fileLimit: (size: string) => `Up to ${size} each.`,
  fileTooLarge: (name: string, size: string, limit: string) =>
    `${name} is ${size}; the limit is ${limit}. Choose a smaller file.`,
  fileWrongType: (name: string, types: string) =>
    `${name} is of another type. Choose a file of type ${types}.`,
  theme: 'Look',
  themes: { system: 'As the system', light: 'Light', dark: 'Dark' },
  filters: 'Filters',
  order: 'Order',
  clearFilters: 'Clear the filters',
  today: 'today',
  tomorrow: 'tomorrow',
  yesterday: 'yesterday',
  inDays: (days: number) => `in ${days} d`,
  daysAgo: (days: number) => `${days} d ago`,
  dayAndTime: (day: string, time: string) => `${day} ${time}`,
  spanTo: (from: string, to: string) => `${from} to ${to}`,
  timeGap: (zone: string) =>
    `This time does not exist on that day in ${zone}: the clock is put forward. Choose another time.`,
  timeInvalid: 'Give a day and a time.',
  notANumber: 'Give a number, for example 12.5.',
} as const;
