import { execFile } from 'node:child_process';
import { promisify } from 'node:util';
import { sql } from 'drizzle-orm';
import { afterEach, beforeEach, describe, expect, test } from 'vitest';
import { connectDatabase } from '#server/db/client.ts';
import type { Database, Tx } from '#server/db/client.ts';
import { recordAudit } from '#server/features/audit/audit.service.ts';
import { sealHash } from '#server/features/audit/seal-hash.ts';
import { sealTrail, verifyTrail } from '#server/features/audit/seal-trail.service.ts';
import { createWorkerBench, eventually } from '#tests/support/worker-bench.ts';
import type { WorkerBench } from '#tests/support/worker-bench.ts';

let bench: WorkerBench;
let owner: Database;
beforeEach(async () => {
  bench = await createWorkerBench();
  owner = connectDatabase({ url: bench.ownerUrl, maxConnections: 2 });
});
afterEach(async () => {
  await owner.close();
  await bench.drop();
});

async function record(tx: Tx, note: string): Promise<void> {
  await recordAudit(bench.deps, tx, {
    actor: null,
    site: null,
    action: 'equipment.edit',
    subjectKind: 'instrument',
    subjectId: 5,
    before: null,
    after: { note, precise: 0.1 },
  });
}
const write = (note: string) => bench.deps.transact((tx) => record(tx, note));

/** Transactions of other databases on the same server hold the sealer up for a moment. */
async function sealAll(count: number): Promise<void> {
  await eventually(`${count} sealed events`, async () => {
    await sealTrail(bench.deps);
    const { rows } = await bench.db.execute(
      sql`select count(seal_no)::int as count from audit_event`,
    );
    return rows[0]?.['count'] === count ? true : undefined;
  });
}

async function notesInOrder(): Promise<unknown[]> {
  const { rows } = await bench.db.execute(sql`
    select after->>'note' as note from audit_event where seal_no is not null order by seal_no`);
  return rows.map((row) => row['note']);
}

/** As somebody could who owns the tables. */
async function tamper(change: ReturnType<typeof sql>): Promise<void> {
  await owner.db.execute(sql`alter table audit_event disable trigger audit_event_only_grows`);
  await owner.db.execute(change);
  await owner.db.execute(sql`alter table audit_event enable trigger audit_event_only_grows`);
}

async function verify(...args: string[]) {
  const run = promisify(execFile)(
    process.execPath,
    ['--import', 'tsx', 'server/cli/audit-verify.ts', ...args],
    { env: { ...process.env, DATABASE_URL: bench.config.database.url } },
  );
  return run.then(
    ({ stdout }) => ({ code: 0, stdout, stderr: '' }),
    (error: unknown) => {
      if (error instanceof Error && 'code' in error && 'stdout' in error && 'stderr' in error) {
        return { code: error.code, stdout: String(error.stdout), stderr: String(error.stderr) };
      }
      throw error;
    },
  );
}

describe('the sealer', () => {
  test('chains what is committed, once', async () => {
    await write('one');
    await write('two');
    await sealAll(2);
    const before = await verifyTrail(bench.deps);
    await write('three');
    await sealAll(3);

    const after = await verifyTrail(bench.deps);
    expect(before).toMatchObject({ verifiedCount: 2, firstBreak: null });
    expect(after).toMatchObject({ verifiedCount: 3, firstBreak: null, unsealedCount: 0 });
    expect(await notesInOrder()).toEqual(['one', 'two', 'three']);
  });

  test('waits for a transaction that began earlier and seals it first', async () => {
    let finish: () => void = () => undefined;
    const maySettle = new Promise<void>((resolve) => {
      finish = resolve;
    });
    let isWritten: () => void = () => undefined;
    const written = new Promise<void>((resolve) => {
      isWritten = resolve;
    });
    const slow = bench.deps.transact(async (tx) => {
      await record(tx, 'began first');
      isWritten();
      await maySettle;
    });
    await written;
    await write('began second');
    await sealTrail(bench.deps);
    const whileOpen = await verifyTrail(bench.deps);

    finish();
    await slow;
    await sealAll(2);

    expect(whileOpen).toMatchObject({ verifiedCount: 0, unsealedCount: 1 });
    expect(await notesInOrder()).toEqual(['began first', 'began second']);
  });

  test('leaves no gap for what was rolled back', async () => {
    await write('one');
    const failing = bench.deps.transact(async (tx) => {
      await record(tx, 'undone');
      throw new Error('undone');
    });
    await expect(failing).rejects.toThrow('undone');
    await write('two');
    await sealAll(2);
    expect(await verifyTrail(bench.deps)).toMatchObject({ verifiedCount: 2, firstBreak: null });
  });

  test('keeps one chain while many write and several seal', async () => {
    const writers = Array.from({ length: 8 }, async (_, writer) => {
      for (let turn = 0; turn < 15; turn += 1) {
        await write(`${writer}-${turn}`);
        await sealTrail(bench.deps);
      }
    });
    await Promise.all(writers);
    await sealAll(120);
    expect(await verifyTrail(bench.deps)).toMatchObject({ verifiedCount: 120, firstBreak: null });
  });

  test('covers more than one batch', async () => {
    await bench.deps.transact(async (tx) => {
      for (let turn = 0; turn < 1100; turn += 1) {
        await record(tx, String(turn));
      }
    });
    await sealAll(1100);
    expect(await verifyTrail(bench.deps)).toMatchObject({ verifiedCount: 1100, firstBreak: null });
  });
});

describe('verifying', () => {
  beforeEach(async () => {
    for (const note of ['one', 'two', 'three', 'four']) {
      await write(note);
    }
    await sealAll(4);
  });

  test('finds the first event that says something else than when it was sealed', async () => {
    await tamper(
      sql`update audit_event set after = jsonb_set(after, '{precise}', '0.10000000000000000001') where seal_no = 3`,
    );
    expect((await verifyTrail(bench.deps)).firstBreak).toMatchObject({
      sealNo: 3,
      reason: 'its content is not what was sealed',
    });
  });

  test('finds an event that was taken out', async () => {
    await tamper(sql`delete from audit_event where seal_no = 2`);
    expect((await verifyTrail(bench.deps)).firstBreak).toMatchObject({
      sealNo: 2,
      reason: 'the next row is number 3: rows are missing',
    });
  });

  test('finds an event that was swapped for one sealed alone', async () => {
    const { rows } = await bench.db.execute(sql`select id from audit_event where seal_no = 2`);
    const forged = sealHash('f'.repeat(64), 2, {
      id: Number(rows[0]?.['id']),
      at: '2026-03-02T08:00:00.000000Z',
      actorId: null,
      siteId: null,
      action: 'equipment.edit',
      subjectKind: 'instrument',
      subjectId: 5,
      before: null,
      after: '{"note": "forged"}',
      requestId: null,
    });
    await tamper(
      sql`update audit_event set after = '{"note": "forged"}', prev_hash = ${'f'.repeat(64)}, hash = ${forged} where seal_no = 2`,
    );
    expect((await verifyTrail(bench.deps)).firstBreak).toMatchObject({
      sealNo: 2,
      reason: 'it does not follow the row before it',
    });
  });

  test('with a noted head, finds an end that was cut off and a chain that was made anew', async () => {
    const { headHash } = await verifyTrail(bench.deps);
    await tamper(sql`delete from audit_event where seal_no = 4`);
    const cut = await verifyTrail(bench.deps, { sealNo: 4, hash: headHash });
    expect(await verifyTrail(bench.deps)).toMatchObject({ verifiedCount: 3, firstBreak: null });
    expect(cut.firstBreak).toMatchObject({ sealNo: 4, eventId: null });

    await write('another four');
    await sealAll(4);
    const anew = await verifyTrail(bench.deps, { sealNo: 4, hash: headHash });
    expect(anew.firstBreak?.reason).toBe('another hash was noted here: the chain was made anew');
  });

  test('the command prints count, break and tail and tells them apart by its exit code', async () => {
    await write('unsealed');
    const whole = await verify();
    const head = /^Head (\S+)$/m.exec(whole.stdout)?.[1] ?? '';
    const again = await verify('--head', head);
    await tamper(sql`delete from audit_event where seal_no = 1`);
    const broken = await verify();
    const wrong = await verify('--head', 'nonsense');

    expect(whole).toMatchObject({ code: 0 });
    expect(whole.stdout).toContain('Verified 4 sealed events.\nNo break.\nNot yet sealed: 1, ');
    expect(again).toEqual(whole);
    expect(broken.code).toBe(1);
    expect(broken.stdout).toMatch(
      /^Verified 0 sealed events\.\nFirst break at number 1 \(event \d+\): /,
    );
    expect(wrong.code).toBe(2);
  });
});
