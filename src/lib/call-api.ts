import { z } from 'zod';
import type { Contract } from '#shared/contracts/define-contract.ts';
import { readProblem, unreachable } from './problem.ts';

export type ApiInput<P extends z.ZodType, Q extends z.ZodType, B extends z.ZodType> = {
  readonly params?: z.input<P>;
  readonly query?: z.input<Q>;
  readonly body?: z.input<B>;
  /** Kept by the caller over retries so that a repeat is recognised; made here when absent. */
  readonly idempotencyKey?: string;
  readonly signal?: AbortSignal;
};

let csrfToken = '';
/** The session query hands over the token; every state-changing call carries it. */
export function setCsrfToken(token: string): void {
  csrfToken = token;
}
export function currentCsrfToken(): string {
  return csrfToken;
}

const scalar = z.union([z.string(), z.number(), z.boolean()]);
const pathValues = z.record(z.string(), scalar);
const queryValues = z.record(
  z.string(),
  z.union([scalar, z.array(scalar), z.null(), z.undefined()]),
);

function fillPath(path: string, params: unknown): string {
  const values = pathValues.parse(params ?? {});
  return path.replaceAll(/:([a-zA-Z]+)/g, (_, name: string) =>
    encodeURIComponent(String(values[name])),
  );
}

function queryText(query: unknown): string {
  const search = new URLSearchParams();
  for (const [name, value] of Object.entries(queryValues.parse(query ?? {}))) {
    if (value === undefined || value === null || value === '') {
      continue;
    }
    search.set(name, Array.isArray(value) ? value.join(',') : String(value));
  }
  const text = search.toString();
  return text === '' ? '' : `?${text}`;
}

/** The key of a query: invalidate by path to refresh everything read from an endpoint. */
export function apiKey(contract: Contract, input: { params?: unknown; query?: unknown } = {}) {
  return [contract.path, input.params ?? {}, input.query ?? {}] as const;
}

async function readJson(response: Response): Promise<unknown> {
  const text = await response.text();
  if (text === '') {
    return undefined;
  }
  try {
    return JSON.parse(text);
  } catch (error) {
    if (error instanceof SyntaxError) {
      return undefined;
    }
    throw error;
  }
}

/** A file travels as it is; everything else as JSON. */
function sentBody(body: unknown): { type: string; content: string | Blob } | undefined {
  if (body === undefined) {
    return undefined;
  }
  return body instanceof Uint8Array
    ? { type: 'application/octet-stream', content: new Blob([new Uint8Array(body)]) }
    : { type: 'application/json', content: JSON.stringify(body) };
}

/** Calls one endpoint, checks the answer against its contract and throws `ProblemError` otherwise. */
export async function callApi<
  P extends z.ZodType,
  Q extends z.ZodType,
  B extends z.ZodType,
  R extends z.ZodType,
>(contract: Contract<P, Q, B, R>, input: ApiInput<P, Q, B> = {}): Promise<z.output<R>> {
  const headers = new Headers({ accept: 'application/json' });
  if (contract.method !== 'GET') {
    headers.set('x-millpond-csrf', csrfToken);
  }
  if (contract.idempotent) {
    headers.set('idempotency-key', input.idempotencyKey ?? crypto.randomUUID());
  }
  const body = sentBody(input.body);
  if (body !== undefined) {
    headers.set('content-type', body.type);
  }
  let response: Response;
  try {
    response = await fetch(fillPath(contract.path, input.params) + queryText(input.query), {
      method: contract.method,
      headers,
      credentials: 'same-origin',
      ...(body === undefined ? {} : { body: body.content }),
      ...(input.signal ? { signal: input.signal } : {}),
    });
  } catch (error) {
    if (error instanceof DOMException && error.name === 'AbortError') {
      throw error;
    }
    throw unreachable();
  }
  const answer = await readJson(response);
  if (!response.ok) {
    throw readProblem(response.status, answer);
  }
  return contract.response.parse(answer);
}
