import type { z } from 'zod';
import type { Deps } from '#server/deps.ts';
import type { JobDefinition } from '#server/jobs/define-job.ts';
import { PoisonJobError } from '#server/jobs/job-queue.ts';

/** Runs the jobs of one kind; `Name` keeps a handler from standing under another job's name. */
export type Handler<Name extends string = string> = {
  readonly name: Name;
  readonly run: (deps: Deps, payload: unknown) => Promise<void>;
};

/** Parses the payload and calls one service function. A payload that does not fit is poison. */
export function defineHandler<const Name extends string, Payload extends z.ZodObject>(
  definition: JobDefinition<Name, Payload>,
  work: (deps: Deps, payload: z.output<Payload>) => Promise<unknown>,
): Handler<Name> {
  return {
    name: definition.name,
    run: async (deps, payload) => {
      const parsed = definition.payload.safeParse(payload);
      if (!parsed.success) {
        throw new PoisonJobError(`The payload does not fit: ${parsed.error.message}`);
      }
      await work(deps, parsed.data);
    },
  };
}
