import type { JobSchedule, PreparedJob } from './define-job.ts';

/** A schedule as it stands for one site, or for the whole company. */
export type PlannedSchedule = {
  /** One plan per id: planning it again replaces it. */
  readonly id: string;
  readonly job: PreparedJob;
  readonly when:
    | Extract<JobSchedule, { kind: 'every' }>
    | (Extract<JobSchedule, { kind: 'site-day' }> & { readonly zone: string });
};

/** Where background work waits. It may be lost: PostgreSQL holds what must be done. */
export interface JobQueue {
  /** Resolves once every job is surely in the queue; a job whose id is known there stays one. */
  add(jobs: readonly PreparedJob[]): Promise<void>;
  /** Makes exactly these schedules stand. */
  plan(schedules: readonly PlannedSchedule[]): Promise<void>;
  close(): Promise<void>;
}

/** A job as the queue hands it out; nothing about its content is trusted yet. */
export type ReceivedJob = {
  readonly id: string;
  readonly name: string;
  readonly data: unknown;
  /** 1 at first. */
  readonly attempt: number;
};

/** A job that no repeat can mend: it is put aside at once. */
export class PoisonJobError extends Error {
  override readonly name = 'PoisonJobError';
}
