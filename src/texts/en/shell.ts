import type { Role } from '#shared/domain/policies/actions.ts';

const roleWords: Record<Role, string> = {
  engineer: 'engineer',
  scheduler: 'scheduler',
  metrologist: 'metrologist',
  manager: 'manager',
  safety: 'safety officer',
  auditor: 'auditor',
  admin: 'administrator',
};

export const shell = {
  roles: roleWords,
  noRole: 'no role here',
  nav: {
    today: 'Today',
    board: 'Board',
    requests: 'Requests',
    bookings: 'Bookings',
    equipment: 'Equipment',
    metrology: 'Metrology',
    settings: 'Settings',
    help: 'Help',
  },
  wait: 'Loading the page.',
  noSiteTitle: 'No site for you yet',
  noSite:
    'You are signed in, but hold no role at any site. Ask an administrator to grant you one, then load this page again.',
  notFoundTitle: 'Not found',
  notFound:
    'There is nothing at this address, or it is not yours to see. Check the address, or go back to Today.',
  toToday: 'To Today',
  failedTitle: 'This page failed',
  failed: 'The page met a fault and stopped. What the server holds is safe. Load the page again.',
  reload: 'Load again',
  signOutFailed: 'Signing out did not work. Try again, or close the browser.',
  findTitle: 'Find',
  findIntro: (text: string) => `Tags, serials and record numbers that match “${text}”.`,
  findNothing: (text: string) =>
    `Nothing matches “${text}”. Try a tag like C03, a serial, or a record number.`,
  findNone: 'Type a tag, a serial or a record number in the field above.',
  findCaption: 'What was found',
  findKinds: {
    instrument: 'instrument',
    booking: 'booking',
    request: 'request',
    cell: 'cell',
    calibration: 'calibration',
  },
  findColumns: { kind: 'Kind', what: 'What', detail: 'Detail' },
} as const;
