import type { AuditEventDto } from '#shared/contracts/audit.contract.ts';
import type { AuditRow } from './audit.repository.ts';

export function presentAuditEvent({ event, actorName }: AuditRow): AuditEventDto {
  return {
    id: event.id,
    at: event.at.toISOString(),
    actor:
      event.actorId === null || actorName === null ? null : { id: event.actorId, name: actorName },
    action: event.action,
    subjectKind: event.subjectKind,
    subjectId: event.subjectId,
    before: event.before,
    after: event.after,
    requestId: event.requestId,
    sealNo: event.sealNo,
  };
}
