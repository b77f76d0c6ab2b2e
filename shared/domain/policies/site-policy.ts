type NumberPolicy = {
  readonly kind: 'number';
  readonly label: string;
  readonly unit: string;
  readonly fallback: number;
  readonly min: number;
  readonly max: number;
  readonly isWhole: boolean;
};
type FlagPolicy = { readonly kind: 'flag'; readonly label: string; readonly fallback: boolean };
type OutcomePolicy = {
  readonly kind: 'outcome';
  readonly label: string;
  readonly fallback: 'caution' | 'stop';
};
type DaysPolicy = {
  readonly kind: 'days';
  readonly label: string;
  readonly unit: string;
  readonly fallback: readonly number[];
  readonly min: number;
  readonly max: number;
};
/** What a site may decide for itself: its kind, default, unit and limits. */
export type PolicyDefinition = NumberPolicy | FlagPolicy | OutcomePolicy | DaysPolicy;

/** Every policy key with its default and limits. A site that never set one uses the default. */
export const policyDefinitions = {
  safePercentile: {
    kind: 'number',
    label: 'Probability that the booked hold is long enough',
    unit: '%',
    fallback: 90,
    min: 50,
    max: 95,
    isWhole: true,
  },
  maxHoldHours: {
    kind: 'number',
    label: 'Longest hold offered',
    unit: 'h',
    fallback: 72,
    min: 1,
    max: 72,
    isWhole: true,
  },
  horizonDays: {
    kind: 'number',
    label: 'How far ahead a slot may be booked',
    unit: 'd',
    fallback: 120,
    min: 7,
    max: 400,
    isWhole: true,
  },
  noShowHours: {
    kind: 'number',
    label: 'Hours after the start at which an unused booking is released',
    unit: 'h',
    fallback: 2,
    min: 1,
    max: 72,
    isWhole: true,
  },
  stabilityMaxAgeDays: {
    kind: 'number',
    label: 'Oldest chamber log that counts',
    unit: 'd',
    fallback: 90,
    min: 7,
    max: 365,
    isWhole: true,
  },
  stabilityTemperatureWindowK: {
    kind: 'number',
    label: 'How far a log may lie from the set temperature',
    unit: 'K',
    fallback: 0.5,
    min: 0.1,
    max: 5,
    isWhole: false,
  },
  logCannotTellOutcome: {
    kind: 'outcome',
    label: 'Reported work where the log cannot tell',
    fallback: 'caution',
  },
  engineersMayConfirm: {
    kind: 'flag',
    label: 'Engineers confirm offers for their own requests',
    fallback: false,
  },
  matchAttended: {
    kind: 'flag',
    label: 'Somebody must be present at the match',
    fallback: false,
  },
  connectFixedMin: {
    kind: 'number',
    label: 'Connect, fixed part',
    unit: 'min',
    fallback: 10,
    min: 0,
    max: 120,
    isWhole: true,
  },
  connectPerCellMin: {
    kind: 'number',
    label: 'Connect, for each cell',
    unit: 'min',
    fallback: 3,
    min: 0,
    max: 60,
    isWhole: true,
  },
  unloadFixedMin: {
    kind: 'number',
    label: 'Unload, fixed part',
    unit: 'min',
    fallback: 10,
    min: 0,
    max: 120,
    isWhole: true,
  },
  unloadPerCellMin: {
    kind: 'number',
    label: 'Unload, for each cell',
    unit: 'min',
    fallback: 3,
    min: 0,
    max: 60,
    isWhole: true,
  },
  matchMin: {
    kind: 'number',
    label: 'Match',
    unit: 'min',
    fallback: 20,
    min: 5,
    max: 240,
    isWhole: true,
  },
  minimumMeasureMin: {
    kind: 'number',
    label: 'Shortest measurement',
    unit: 'min',
    fallback: 60,
    min: 5,
    max: 1440,
    isWhole: true,
  },
  referenceLeadResistanceOhm: {
    kind: 'number',
    label: 'Lead resistance assumed before a path is chosen',
    unit: 'Ω',
    fallback: 0.5,
    min: 0,
    max: 100,
    isWhole: false,
  },
  reminderLeadDays: {
    kind: 'days',
    label: 'Days before a due date at which a reminder goes out',
    unit: 'd',
    fallback: [30, 14, 7, 1],
    min: 1,
    max: 180,
  },
} as const satisfies Record<string, PolicyDefinition>;

/** One of the keys of {@link policyDefinitions}. */
export type PolicyKey = keyof typeof policyDefinitions;
type Definitions = typeof policyDefinitions;
type ValueOf<Definition> = Definition extends { kind: 'number' }
  ? number
  : Definition extends { kind: 'flag' }
    ? boolean
    : Definition extends { kind: 'outcome' }
      ? 'caution' | 'stop'
      : readonly number[];
/** Every policy of a site with the value in force. */
export type SitePolicy = { readonly [Key in PolicyKey]: ValueOf<Definitions[Key]> };
/** A value of any policy, as stored and sent. */
export type PolicyValue = SitePolicy[PolicyKey];

/** Decides whether a text names a policy. */
export function isPolicyKey(key: string): key is PolicyKey {
  return Object.hasOwn(policyDefinitions, key);
}
