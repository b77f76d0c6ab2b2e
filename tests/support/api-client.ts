import { randomUUID } from 'node:crypto';
import type { z } from 'zod';
import type { Contract } from '#shared/contracts/define-contract.ts';
import { getSession } from '#shared/contracts/session.contract.ts';

type Input = {
  readonly params?: Readonly<Record<string, string | number>>;
  readonly query?: Readonly<Record<string, string>>;
  readonly body?: unknown;
};

/** Calls a running Millpond as a demo person, signed in through the stand-in like a browser. */
export async function createTestClient(url: string, sub: string) {
  const jars = new Map<string, Map<string, string>>();
  const visit = async (address: string, init: RequestInit = {}): Promise<Response> => {
    const { host } = new URL(address);
    const jar = jars.get(host) ?? new Map<string, string>();
    jars.set(host, jar);
    const headers = new Headers(init.headers);
    headers.set('Cookie', [...jar].map(([name, value]) => `${name}=${value}`).join('; '));
    const response = await fetch(address, { ...init, headers, redirect: 'manual' });
    for (const line of response.headers.getSetCookie()) {
      const [pair = ''] = line.split(';');
      const at = pair.indexOf('=');
      jar.set(pair.slice(0, at), pair.slice(at + 1));
    }
    return response;
  };
  let address = `${url}/auth/sign-in?as=${sub}&return=/api/health`;
  for (let step = 0; step < 15; step += 1) {
    const response = await visit(address);
    const location = response.headers.get('location');
    if (location === null) {
      break;
    }
    address = new URL(location, address).href;
  }
  const session = getSession.response.parse(await (await visit(`${url}/api/session`)).json());
  return {
    call: async <R extends z.ZodType>(
      contract: Contract<z.ZodType, z.ZodType, z.ZodType, R>,
      input: Input,
    ): Promise<z.output<R>> => {
      const path = contract.path.replaceAll(/:(\w+)/g, (_match, name: string) =>
        encodeURIComponent(String(input.params?.[name])),
      );
      const query = new URLSearchParams(input.query).toString();
      const response = await visit(`${url}${path}${query === '' ? '' : `?${query}`}`, {
        method: contract.method,
        headers: {
          'Content-Type': 'application/json',
          'X-Millpond-Csrf': session.csrfToken ?? '',
          'Idempotency-Key': randomUUID(),
        },
        ...(input.body === undefined ? {} : { body: JSON.stringify(input.body) }),
      });
      const answer: unknown = await response.json();
      if (!response.ok) {
        throw new Error(`${contract.name} answered ${response.status}: ${JSON.stringify(answer)}`);
      }
      return contract.response.parse(answer);
    },
  };
}
