import type { z } from 'zod';
import type { JobDefinition } from './define-job.ts';
import { pruneOutboxJob } from './definitions/prune-outbox.job.ts';

/** Every kind of background work. */
export const jobDefinitions = [pruneOutboxJob] as const;

type Definitions = (typeof jobDefinitions)[number];
export type JobName = Definitions['name'];
export type PayloadOf<Name extends JobName> = z.output<
  Extract<Definitions, { readonly name: Name }>['payload']
>;

export function findJobDefinition(name: string): JobDefinition | undefined {
  return jobDefinitions.find((definition) => definition.name === name);
}
