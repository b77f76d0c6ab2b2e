import { createHash } from 'node:crypto';

/** A row as it is sealed: texts as PostgreSQL writes them, so that no digit is lost on the way. */
export type SealedContent = {
  readonly id: number;
  readonly at: string;
  readonly actorId: number | null;
  readonly siteId: number | null;
  readonly action: string;
  readonly subjectKind: string;
  readonly subjectId: number | null;
  readonly before: string | null;
  readonly after: string | null;
  readonly requestId: string | null;
};

/** What the first row of a chain follows. */
export const chainStart = '0'.repeat(64);

/**
 * SHA-256 over the row before, the row's place and all it says, in hexadecimal. The members stand in a
 * list, so that nothing can move from one into the next unnoticed.
 */
export function sealHash(prevHash: string, sealNo: number, row: SealedContent): string {
  const members = [
    prevHash,
    sealNo,
    row.id,
    row.at,
    row.actorId,
    row.siteId,
    row.action,
    row.subjectKind,
    row.subjectId,
    row.before,
    row.after,
    row.requestId,
  ];
  return createHash('sha256').update(JSON.stringify(members), 'utf8').digest('hex');
}
