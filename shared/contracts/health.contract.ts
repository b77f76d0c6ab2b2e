import { z } from 'zod';
import { instant, noBody, noQuery } from './common.ts';
import { defineContract } from './define-contract.ts';

export const getHealth = defineContract({
  name: 'get-health',
  method: 'GET',
  path: '/api/health',
  summary: 'Whether the server runs and reaches its database; 503 where it does not.',
  params: z.strictObject({}),
  query: noQuery,
  body: noBody,
  response: z.object({
    isReady: z.literal(true),
    now: instant,
    /** Effects written but not yet handed to the queue. */
    outboxWaiting: z.int(),
    /** Age of the oldest of them in whole seconds; 0 where none waits. */
    outboxOldestS: z.int(),
    auditUnsealed: z.int(),
  }),
  status: 200,
  access: { kind: 'public' },
  idempotent: false,
  problems: ['service.unavailable'],
});
