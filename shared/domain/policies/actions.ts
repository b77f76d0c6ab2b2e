/** The roles a person can hold, each at a site or (origin claim without `@site`) at every site. */
export const roles = [
  'engineer',
  'scheduler',
  'metrologist',
  'manager',
  'safety',
  'auditor',
  'admin',
] as const;
/** One of {@link roles}. */
export type Role = (typeof roles)[number];

/** Everything a person can be allowed or refused, apart from reading at a site where they hold a role. */
export const actions = [
  'request.create',
  'request.edit',
  'request.withdraw',
  'request.decline',
  'request.prioritise',
  'request.propose',
  'booking.confirm',
  'booking.move',
  'booking.cancel',
  'load.close',
  'cell.register',
  'equipment.edit',
  'cell-type.draft',
  'outage.plan',
  'breakdown.report',
  'equipment.take-out-of-service',
  'calibration.record',
  'calibration.approve',
  'stability.assess',
  'equipment.release',
  'deviation.grant',
  'cell-type.release',
  'policy.edit',
  'people.manage',
  'audit.read',
] as const;
/** One of {@link actions}. */
export type Action = (typeof actions)[number];
