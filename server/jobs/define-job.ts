import type { z } from 'zod';

/** When a job comes by itself. */
export type JobSchedule =
  /** Each day at a wall-clock hour of the site, for every site by itself. */
  | { readonly kind: 'site-day'; readonly hour: number }
  /** Again and again. */
  | { readonly kind: 'every'; readonly everyMs: number };

/** One kind of background work: what it is called, what it is told, how often it is tried. */
export type JobDefinition<
  Name extends string = string,
  Payload extends z.ZodObject = z.ZodObject,
> = {
  /** Kept for ever: queued jobs are found by it. */
  readonly name: Name;
  /** Numbers of records, never their content. */
  readonly payload: Payload;
  readonly attempts: number;
  /** Pause before the second attempt; it doubles from one to the next. */
  readonly firstPauseMs: number;
  readonly schedule: JobSchedule | null;
  /** Two jobs with one id are one while the queue remembers it. Null: each is a job of its own. */
  readonly jobId: ((payload: z.output<Payload>) => string) | null;
};

const jobIdShape = /^(?=.*[^\d])[\w.-]+$/;

/** A job in the shape the queue takes; throws a ZodError where the payload does not fit. */
export type PreparedJob = {
  readonly name: string;
  readonly payload: Readonly<Record<string, unknown>>;
  readonly jobId: string | null;
  readonly attempts: number;
  readonly firstPauseMs: number;
  /** Of the call that caused it, so that one number leads through both logs. */
  readonly requestId: string | null;
};

export function defineJob<const Name extends string, Payload extends z.ZodObject>(
  definition: JobDefinition<Name, Payload>,
): JobDefinition<Name, Payload> {
  return Object.freeze(definition);
}

export function prepareJob<Payload extends z.ZodObject>(
  definition: JobDefinition<string, Payload>,
  payload: unknown,
  requestId: string | null,
): PreparedJob {
  const parsed = definition.payload.parse(payload);
  const jobId = definition.jobId?.(parsed) ?? null;
  if (jobId !== null && !jobIdShape.test(jobId)) {
    throw new RangeError(`"${jobId}" cannot be the id of a job.`);
  }
  const { name, attempts, firstPauseMs } = definition;
  return { name, payload: parsed, jobId, attempts, firstPauseMs, requestId };
}
