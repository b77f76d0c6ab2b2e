/** Where the time comes from; tests bring their own. */
export interface Clock {
  now(): Date;
}

export const systemClock: Clock = { now: () => new Date() };
