import { z } from 'zod';
import {
  instant,
  noBody,
  pageOf,
  pageQuery,
  personRef,
  recordNumberText,
  siteParams,
} from './common.ts';
import { defineContract } from './define-contract.ts';

export const auditEventSchema = z.object({
  id: z.int().positive(),
  at: instant,
  /** Null where the system itself acted. */
  actor: personRef.nullable(),
  /** What was done, e.g. `booking.confirm`. */
  action: z.string(),
  subjectKind: z.string(),
  subjectId: z.int().nullable(),
  before: z.unknown(),
  after: z.unknown(),
  requestId: z.string().nullable(),
  /** Its place in the sealed chain; null for the few seconds until it is sealed. */
  sealNo: z.int().nullable(),
});
export type AuditEventDto = z.infer<typeof auditEventSchema>;

export const listAuditEvents = defineContract({
  name: 'list-audit-events',
  method: 'GET',
  path: '/api/sites/:site/audit-events',
  summary: 'What was done at the site, newest first.',
  params: siteParams,
  query: z.strictObject({
    ...pageQuery,
    subjectKind: z.string().max(40).exactOptional(),
    subjectId: recordNumberText.exactOptional(),
    actorId: recordNumberText.exactOptional(),
    action: z.string().max(60).exactOptional(),
    from: instant.exactOptional(),
    to: instant.exactOptional(),
  }),
  body: noBody,
  response: pageOf(auditEventSchema),
  status: 200,
  access: { kind: 'action', action: 'audit.read' },
  idempotent: false,
  problems: [],
});
