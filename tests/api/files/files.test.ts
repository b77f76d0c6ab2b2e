import { createHash } from 'node:crypto';
import { afterAll, beforeAll, expect, test } from 'vitest';
import { fileChunksTable } from '#server/db/tables/file.table.ts';
import { connectDatabase } from '#server/db/client.ts';
import {
  downloadFile,
  getFile,
  maxFileBytes,
  uploadFile,
} from '#shared/contracts/files.contract.ts';
import { startTestApp } from '#tests/support/test-app.ts';
import type { TestApp, TestPerson } from '#tests/support/test-app.ts';

let app: TestApp;
let fennick: TestPerson;
beforeAll(async () => {
  app = await startTestApp();
  fennick = await app.signInAs({ roles: ['metrologist'] });
});
afterAll(() => app.stop());

function pdf(size: number): Uint8Array {
  const bytes = new Uint8Array(size).fill(0x20);
  bytes.set(new TextEncoder().encode('%PDF-1.7\n'));
  return bytes;
}
const hashOf = (bytes: Uint8Array) => createHash('sha256').update(bytes).digest('hex');

test('a file of several chunks comes back byte for byte, as what it is', async () => {
  const bytes = pdf(2_500_000);
  bytes[2_400_000] = 7;
  const { body, status } = await app.call(uploadFile, fennick, {
    query: { name: 'certificate 88.pdf', sha256: hashOf(bytes) },
    body: bytes,
  });
  expect(status).toBe(201);
  expect(body).toMatchObject({ mediaType: 'application/pdf', sizeBytes: 2_500_000 });
  expect((await app.call(getFile, fennick, { params: { id: body.id } })).body).toEqual(body);

  const answer = await app.send(downloadFile, fennick, { params: { id: body.id } });
  expect(hashOf(new Uint8Array(await answer.arrayBuffer()))).toBe(hashOf(bytes));
  expect(answer.headers.get('content-type')).toContain('application/pdf');
  expect(answer.headers.get('x-content-type-options')).toBe('nosniff');
});

test('a repeat with the same key stores the file once', async () => {
  const input = {
    query: { name: 'twice.pdf' },
    body: pdf(100),
    idempotencyKey: '3b0b4f3e-4f0f-4b0e-9a53-0d0f1a2b3c4d',
  };
  const first = await app.call(uploadFile, fennick, input);
  const second = await app.call(uploadFile, fennick, input);
  expect(second.body.id).toBe(first.body.id);
});

test('the content decides, not the name: a program renamed to PDF is refused', async () => {
  const program = new Uint8Array(400);
  program.set([0x4d, 0x5a, 0x90]);
  const { status, problem } = await app.callRefused(uploadFile, fennick, {
    query: { name: 'certificate.pdf' },
    body: program,
  });
  expect([status, problem.code]).toEqual([422, 'file.type']);
});

test('a file that arrives changed or too large is refused and not kept', async () => {
  const changed = await app.callRefused(uploadFile, fennick, {
    query: { name: 'a.pdf', sha256: '0'.repeat(64) },
    body: pdf(100),
  });
  expect([changed.status, changed.problem.code]).toEqual([409, 'file.incomplete']);
  const large = await app.callRefused(uploadFile, fennick, {
    query: { name: 'a.pdf' },
    body: pdf(maxFileBytes + 1),
  });
  expect([large.status, large.problem.code]).toEqual([413, 'file.too-large']);
});

test('a stored file that no longer matches its checksum is not passed on', async () => {
  const { body } = await app.call(uploadFile, fennick, {
    query: { name: 'a.pdf' },
    body: pdf(100),
  });
  // The runtime role may not change chunks; the owner stands for a damaged disk.
  const owner = connectDatabase({ url: app.ownerUrl });
  await owner.db.update(fileChunksTable).set({ bytes: Buffer.from('%PDF-damaged') });
  await owner.close();
  const { status, problem } = await app.callRefused(downloadFile, fennick, {
    params: { id: body.id },
  });
  expect([status, problem.code]).toEqual([409, 'file.incomplete']);
});

test('a file of another site is not there', async () => {
  const { body } = await app.call(uploadFile, fennick, {
    query: { name: 'a.pdf' },
    body: pdf(100),
  });
  const elsewhere = await app.signInAs({ roles: ['metrologist@otterholm'] });
  const answer = await app.callRefused(getFile, elsewhere, {
    params: { site: 'otterholm', id: body.id },
  });
  expect(answer.status).toBe(404);
});
