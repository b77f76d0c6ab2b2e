import { createTransport } from 'nodemailer';
import { afterAll, beforeAll, expect, test } from 'vitest';
import { z } from 'zod';
import { start as startIdentity } from '#fakes/identity/server.ts';
import type { IdentityStandIn } from '#fakes/identity/server.ts';
import { start as startMail } from '#fakes/mail/server.ts';
import type { MailStandIn } from '#fakes/mail/server.ts';

let identity: IdentityStandIn;
let mail: MailStandIn;
beforeAll(async () => {
  identity = await startIdentity({
    port: 0,
    clientId: 'millpond',
    clientSecret: 'secret',
    redirectUris: ['http://127.0.0.1:4300/auth/callback'],
    postLogoutRedirectUris: ['http://127.0.0.1:4300/'],
  });
  mail = await startMail({ smtpPort: 0, httpPort: 0, folder: null });
});
afterAll(async () => {
  await identity.close();
  await mail.close();
});

const callsSchema = z.array(z.looseObject({ messageId: z.string().nullish() }));

async function calls() {
  return callsSchema.parse(await (await fetch(`${mail.url}/__calls`)).json());
}

function letter(messageId: string) {
  return createTransport({ url: mail.smtpUrl }).sendMail({
    from: 'millpond@larkfen.example',
    to: 'fennick@larkfen.example',
    subject: 'M07 falls due tomorrow',
    text: 'M07 falls due tomorrow.',
    html: '<p>M07 falls due tomorrow.</p>',
    messageId,
  });
}

test('the identity stand-in announces itself as OpenID Connect Discovery 1.0 asks', async () => {
  const answer = await fetch(`${identity.url}/.well-known/openid-configuration`);
  const document = z
    .looseObject({ issuer: z.string(), code_challenge_methods_supported: z.array(z.string()) })
    .parse(await answer.json());
  expect(document.issuer).toBe(identity.url);
  expect(document.code_challenge_methods_supported).toContain('S256');
});

test('it refuses a sign-in without PKCE and an address it does not know', async () => {
  const ask = (change: Record<string, string>) => {
    const query = new URLSearchParams({
      client_id: 'millpond',
      response_type: 'code',
      scope: 'openid',
      redirect_uri: 'http://127.0.0.1:4300/auth/callback',
      ...change,
    });
    return fetch(`${identity.url}/auth?${query.toString()}`, { redirect: 'manual' });
  };
  const plain = await ask({});
  expect(plain.headers.get('location')).toContain('error=invalid_request');
  const foreign = await ask({ redirect_uri: 'http://elsewhere.example/' });
  expect(foreign.status).toBe(400);
});

test('the mail stand-in keeps what it takes and shows it', async () => {
  await letter('<one@millpond>');
  const kept = await calls();
  expect(kept.map(({ messageId }) => messageId)).toContain('<one@millpond>');
  const page = await (await fetch(mail.url)).text();
  expect(page).toContain('M07 falls due tomorrow');
});

test('told to fail, it refuses the next letter and keeps nothing of it', async () => {
  const body = JSON.stringify({ kind: 'fail', code: 451, message: 'try again later' });
  await fetch(`${mail.url}/__next`, { method: 'POST', body });
  await expect(letter('<two@millpond>')).rejects.toThrow('451');
  expect((await calls()).map(({ messageId }) => messageId)).not.toContain('<two@millpond>');
  await letter('<two@millpond>');
  expect((await calls()).map(({ messageId }) => messageId)).toContain('<two@millpond>');
});

test('told to break off after taking it, it keeps the letter although the sender hears no 250', async () => {
  await fetch(`${mail.url}/__next`, { method: 'POST', body: '{"kind":"afterAccept"}' });
  await expect(letter('<three@millpond>')).rejects.toThrow();
  expect((await calls()).map(({ messageId }) => messageId)).toContain('<three@millpond>');
});
