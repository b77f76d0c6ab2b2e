import { sql } from 'drizzle-orm';
import { z } from 'zod';
import type { Reader } from '#server/db/client.ts';

const backlogSchema = z.object({
  outboxWaiting: z.coerce.number(),
  outboxOldestAt: z.coerce.date().nullable(),
  auditUnsealed: z.coerce.number(),
});

export async function getBacklog(db: Reader) {
  const { rows } = await db.execute(sql`
    select
      (select count(*) from outbox where relayed_at is null) as "outboxWaiting",
      (select min(created_at) from outbox where relayed_at is null) as "outboxOldestAt",
      (select count(*) from audit_event where seal_no is null) as "auditUnsealed"`);
  return backlogSchema.parse(rows[0]);
}
