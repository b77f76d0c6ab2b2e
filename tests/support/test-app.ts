import { randomUUID } from 'node:crypto';
import { once } from 'node:events';
import { createServer } from 'node:http';
import { z } from 'zod';
import { createApp } from '#server/app.ts';
import type { Db } from '#server/db/client.ts';
import { buildDeps } from '#server/deps.ts';
import type { Deps, Replacements } from '#server/deps.ts';
import type { Route } from '#server/http/define-route.ts';
import { createSessionStore } from '#server/http/sessions.ts';
import type { Contract } from '#shared/contracts/define-contract.ts';
import { problemSchema } from '#shared/contracts/problems.ts';
import { buildSite } from './build-site.ts';
import { createTestClock } from './test-clock.ts';
import type { TestClock } from './test-clock.ts';
import { testConfig } from './test-config.ts';
import { createTestDatabase } from './test-database.ts';
import { signInPerson } from './test-people.ts';
import type { PersonWish, TestPerson } from './test-people.ts';

export type CallInput = {
  readonly params?: Readonly<Record<string, string | number>>;
  readonly query?: Readonly<Record<string, string | number>>;
  readonly body?: unknown;
  /** Sent by itself where the contract wants one; name it to repeat a call. */
  readonly idempotencyKey?: string | null;
  /** The person's own by itself; name it to send another, null to send none. */
  readonly csrfToken?: string | null;
};
export type Answered<Body> = {
  readonly status: number;
  readonly body: Body;
  readonly headers: Headers;
};

export type TestApp = Awaited<ReturnType<typeof startTestApp>>;

type Options = Replacements & {
  readonly environment?: Readonly<Record<string, string>>;
  readonly routes?: readonly Route[];
  readonly clientFolder?: string;
  /** Any free one by itself. */
  readonly port?: number;
};

/**
 * The real app on a free port over a real, empty database with two sites, larkfen and otterholm.
 * The clock stands still at 2026-03-02 08:00 UTC, a Monday, until a test moves it.
 */
export async function startTestApp(options: Options = {}) {
  const { environment = {}, routes, clientFolder, port: wantedPort = 0, ...replacements } = options;
  const testDatabase = await createTestDatabase();
  const clock = createTestClock();
  const config = testConfig({ DATABASE_URL: testDatabase.url, ...environment });
  const { deps, database, close } = buildDeps(config, { clock, ...replacements });
  const store = createSessionStore(database.pool, deps.log);
  await buildSite(database.db, { code: 'larkfen', name: 'Larkfen', zone: 'Europe/Dublin' });
  await buildSite(database.db, { code: 'otterholm', name: 'Otterholm', zone: 'America/Toronto' });
  const app = createApp({
    deps,
    sessionStore: store,
    ...(routes === undefined ? {} : { routes }),
    ...(clientFolder === undefined ? {} : { clientFolder }),
  });
  const server = createServer(app).listen(wantedPort, '127.0.0.1');
  await once(server, 'listening');
  const { port } = z.object({ port: z.number() }).parse(server.address());
  const url = `http://127.0.0.1:${port}`;

  return {
    url,
    deps,
    clock,
    database,
    ownerUrl: testDatabase.ownerUrl,
    /** For factories and for looking at rows no endpoint shows. */
    db: database.db,
    signInAs: (wish: PersonWish = {}): Promise<TestPerson> =>
      signInPerson({ db: database.db, config, store, at: clock.now() }, wish),
    call: async <R extends z.ZodType>(
      contract: Contract<z.ZodType, z.ZodType, z.ZodType, R>,
      person: TestPerson | null,
      input: CallInput = {},
    ): Promise<Answered<z.output<R>>> => {
      const response = await send(url, contract, person, input);
      const body: unknown = await response.json().catch(() => undefined);
      if (!response.ok) {
        throw new Error(`${contract.name} answered ${response.status}: ${JSON.stringify(body)}`);
      }
      return {
        status: response.status,
        headers: response.headers,
        body: contract.response.parse(body),
      };
    },
    /** The same for a call that is meant to be refused. */
    callRefused: async (contract: Contract, person: TestPerson | null, input: CallInput = {}) => {
      const response = await send(url, contract, person, input);
      const body: unknown = await response.json();
      return {
        status: response.status,
        headers: response.headers,
        problem: problemSchema.parse(body),
      };
    },
    /** The bare response, e.g. for files. */
    send: (contract: Contract, person: TestPerson | null, input: CallInput = {}) =>
      send(url, contract, person, input),
    stop: async () => {
      server.closeAllConnections();
      server.close();
      store.close();
      await close();
      await testDatabase.drop();
    },
  };
}

export type { Db, Deps, TestClock, TestPerson };

function headersOf(contract: Contract, person: TestPerson | null, input: CallInput): Headers {
  const headers = new Headers();
  if (person !== null) {
    headers.set('Cookie', person.cookie);
  }
  const csrfToken = input.csrfToken === undefined ? person?.csrfToken : input.csrfToken;
  if (contract.method !== 'GET' && csrfToken !== undefined && csrfToken !== null) {
    headers.set('X-Millpond-Csrf', csrfToken);
  }
  const key = input.idempotencyKey === undefined ? randomUUID() : input.idempotencyKey;
  if (contract.idempotent && key !== null) {
    headers.set('Idempotency-Key', key);
  }
  return headers;
}

function send(
  url: string,
  contract: Contract,
  person: TestPerson | null,
  input: CallInput,
): Promise<Response> {
  const headers = headersOf(contract, person, input);
  const { body } = input;
  if (body !== undefined) {
    const isBytes = body instanceof Uint8Array;
    headers.set('Content-Type', isBytes ? 'application/octet-stream' : 'application/json');
  }
  return fetch(url + addressOf(contract, input), {
    method: contract.method,
    headers,
    redirect: 'manual',
    ...(body === undefined
      ? {}
      : { body: body instanceof Uint8Array ? Buffer.from(body) : JSON.stringify(body) }),
  });
}

/** `:site` is larkfen unless the test names another. */
function addressOf(contract: Contract, input: CallInput): string {
  const params: Readonly<Record<string, string | number>> = { site: 'larkfen', ...input.params };
  const path = contract.path.replaceAll(/:(\w+)/g, (_match, name: string) =>
    encodeURIComponent(String(params[name])),
  );
  const query = new URLSearchParams(
    Object.entries(input.query ?? {}).map(([name, value]) => [name, String(value)]),
  );
  return query.size === 0 ? path : `${path}?${query.toString()}`;
}
