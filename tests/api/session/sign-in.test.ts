import { createServer } from 'node:http';
import { once } from 'node:events';
import { afterAll, beforeAll, expect, test } from 'vitest';
import { z } from 'zod';
import { start as startIdentity } from '#fakes/identity/server.ts';
import type { IdentityStandIn } from '#fakes/identity/server.ts';
import { getSession } from '#shared/contracts/session.contract.ts';
import { startTestApp } from '#tests/support/test-app.ts';
import type { TestApp } from '#tests/support/test-app.ts';

/** A browser as far as sign-in needs one: cookies by host and port, redirects followed by hand. */
class Browser {
  readonly #jars = new Map<string, Map<string, string>>();

  async visit(address: string, init: RequestInit = {}): Promise<Response> {
    const { host } = new URL(address);
    const jar = this.#jars.get(host) ?? new Map<string, string>();
    this.#jars.set(host, jar);
    const headers = new Headers(init.headers);
    headers.set('Cookie', [...jar].map(([name, value]) => `${name}=${value}`).join('; '));
    const response = await fetch(address, { ...init, headers, redirect: 'manual' });
    for (const line of response.headers.getSetCookie()) {
      const [pair = ''] = line.split(';');
      const at = pair.indexOf('=');
      jar.set(pair.slice(0, at), pair.slice(at + 1));
    }
    return response;
  }

  async follow(address: string): Promise<{ response: Response; visited: string[] }> {
    const visited = [address];
    let response = await this.visit(address);
    for (let step = 0; step < 15 && response.status >= 300 && response.status < 400; step += 1) {
      const next = new URL(response.headers.get('location') ?? '', visited.at(-1)).href;
      visited.push(next);
      response = await this.visit(next);
    }
    return { response, visited };
  }
}

let app: TestApp;
let identity: IdentityStandIn;

async function freePort(): Promise<number> {
  const server = createServer().listen(0, '127.0.0.1');
  await once(server, 'listening');
  const { port } = z.object({ port: z.number() }).parse(server.address());
  server.close();
  await once(server, 'close');
  return port;
}

beforeAll(async () => {
  const port = await freePort();
  const issuer = `http://127.0.0.1:${port}`;
  // The address people open must be known before the provider is told of it.
  const appPort = await freePort();
  const publicUrl = `http://127.0.0.1:${appPort}`;
  app = await startTestApp({
    environment: { OIDC_ISSUER: issuer, PUBLIC_URL: publicUrl },
    port: appPort,
  });
  identity = await startIdentity({
    port,
    clientId: 'millpond',
    clientSecret: 'secret',
    redirectUris: [`${publicUrl}/auth/callback`],
    postLogoutRedirectUris: [`${publicUrl}/`],
    cookieKey: 'a stable key for the test',
  });
});
afterAll(async () => {
  await identity.close();
  await app.stop();
});

async function sessionOf(browser: Browser) {
  const response = await browser.visit(`${app.url}/api/session`);
  return getSession.response.parse(await response.json());
}

test('the code flow with PKCE signs in the chosen person with the roles of the claim', async () => {
  const browser = new Browser();
  expect((await sessionOf(browser)).person).toBeNull();
  const { visited } = await browser.follow(
    `${app.url}/auth/sign-in?as=hallowe&return=/larkfen/requests?mine=true`,
  );
  const asked = new URL(visited[1] ?? '');
  expect(asked.searchParams.get('response_type')).toBe('code');
  expect(asked.searchParams.get('code_challenge_method')).toBe('S256');
  expect(visited.at(-1)).toBe(`${app.url}/larkfen/requests?mine=true`);

  const { person, sites, csrfToken } = await sessionOf(browser);
  expect(person?.name).toBe('B. Hallowe');
  expect(sites.map(({ code, roles }) => [code, roles])).toEqual([['larkfen', ['engineer']]]);
  expect(csrfToken).toMatch(/^[\w-]{20,}$/);
});

test('nobody is led to another site after signing in', async () => {
  for (const wanted of [
    '//elsewhere.example/',
    '/\\elsewhere.example',
    'https://elsewhere.example',
  ]) {
    const { visited } = await new Browser().follow(
      `${app.url}/auth/sign-in?as=osmery&return=${encodeURIComponent(wanted)}`,
    );
    expect(new URL(visited.at(-1) ?? '').origin).toBe(app.url);
  }
});

test('an answer that belongs to no sign-in of this browser is refused', async () => {
  const { visited } = await new Browser().follow(`${app.url}/auth/sign-in?as=osmery&return=/`);
  const callback = visited.find((address) => address.includes('/auth/callback'));
  const stolen = await new Browser().visit(callback ?? '', {
    headers: { Accept: 'application/json' },
  });
  expect(stolen.status).toBe(401);
});

test('a changed state is refused', async () => {
  const browser = new Browser();
  await browser.visit(`${app.url}/auth/sign-in?as=osmery&return=/`);
  const answer = await browser.visit(`${app.url}/auth/callback?code=abc&state=forged`, {
    headers: { Accept: 'application/json' },
  });
  expect(answer.status).toBe(401);
  expect((await sessionOf(browser)).person).toBeNull();
});

test('signing out ends the session here and goes on to end it at the provider', async () => {
  const browser = new Browser();
  await browser.follow(`${app.url}/auth/sign-in?as=marwhin&return=/`);
  const { csrfToken } = await sessionOf(browser);
  const unasked = await browser.visit(`${app.url}/auth/sign-out`, { method: 'POST' });
  expect(unasked.status).toBe(403);
  const answer = await browser.visit(`${app.url}/auth/sign-out`, {
    method: 'POST',
    headers: { 'X-Millpond-Csrf': csrfToken ?? '' },
  });
  expect(answer.status).toBe(303);
  const elsewhere = new URL(answer.headers.get('location') ?? '');
  expect(elsewhere.origin).toBe(identity.url);
  expect(elsewhere.searchParams.get('post_logout_redirect_uri')).toBe(`${app.url}/`);
  expect((await sessionOf(browser)).person).toBeNull();
});

test('a session cookie with a changed signature is worth nothing', async () => {
  const person = await app.signInAs({ roles: ['manager'] });
  const response = await fetch(`${app.url}/api/session`, {
    headers: { Cookie: `${person.cookie}x` },
  });
  expect(getSession.response.parse(await response.json()).person).toBeNull();
});
