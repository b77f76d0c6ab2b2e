import pg from 'pg';

/** What PostgreSQL itself said, wherever in the chain of causes it stands. */
export type DatabaseFault = {
  readonly code: string;
  readonly constraint: string | null;
  readonly table: string | null;
};

const faultKinds = {
  '23P01': 'overlap',
  '23505': 'duplicate',
  '23503': 'reference',
  '23514': 'check',
  '23502': 'missing-value',
} as const;
type FaultKind = (typeof faultKinds)[keyof typeof faultKinds];

/** A rule of the database that a change would have broken. */
export class ConstraintError extends Error {
  override readonly name = 'ConstraintError';
  readonly kind: FaultKind;
  readonly code: string;
  readonly constraint: string;

  constructor(kind: FaultKind, code: string, constraint: string, cause: unknown) {
    super(`The database refused the change: ${constraint} (${kind}).`, { cause });
    this.kind = kind;
    this.code = code;
    this.constraint = constraint;
  }
}

/** The error PostgreSQL sent, looked for through every cause. */
export function findDatabaseFault(error: unknown): DatabaseFault | undefined {
  for (const link of causes(error)) {
    if (link instanceof pg.DatabaseError && link.code !== undefined) {
      return {
        code: link.code,
        constraint: link.constraint ?? null,
        table: link.table ?? null,
      };
    }
  }
  return undefined;
}

/** The broken rule, or undefined where the error is about something else. */
export function findConstraintError(error: unknown): ConstraintError | undefined {
  for (const link of causes(error)) {
    if (link instanceof ConstraintError) {
      return link;
    }
  }
  const fault = findDatabaseFault(error);
  if (fault === undefined || !isFaultCode(fault.code)) {
    return undefined;
  }
  const constraint = fault.constraint ?? fault.table ?? 'unnamed';
  return new ConstraintError(faultKinds[fault.code], fault.code, constraint, error);
}

/**
 * Runs a change and replaces a broken rule by what the map says for it; every other error passes
 * unchanged. A broken rule that is not in the map arrives as a {@link ConstraintError}.
 */
export async function translatingConstraints<Result>(
  translations: Readonly<Record<string, (broken: ConstraintError) => Error>>,
  change: () => Promise<Result>,
): Promise<Result> {
  try {
    return await change();
  } catch (error) {
    const broken = findConstraintError(error);
    if (broken === undefined) {
      throw error;
    }
    throw translations[broken.constraint]?.(broken) ?? broken;
  }
}

/** A deadlock or a serialization failure: the same transaction may well pass a second time. */
export function isWorthRetrying(error: unknown): boolean {
  const code = findDatabaseFault(error)?.code;
  return code === '40P01' || code === '40001';
}

const networkCodes = new Set(['ECONNREFUSED', 'ECONNRESET', 'ETIMEDOUT', 'EPIPE', 'ENOTFOUND']);
const lostConnection = /Connection terminated|timeout exceeded when trying to connect/;

/** The server is down, starting, stopping or out of connections; nothing is wrong with the change. */
export function isDatabaseUnavailable(error: unknown): boolean {
  const code = findDatabaseFault(error)?.code;
  if (code !== undefined) {
    return code.startsWith('08') || code.startsWith('57P') || code === '53300';
  }
  return causes(error).some(
    (link) =>
      lostConnection.test(link.message) ||
      ('code' in link && typeof link.code === 'string' && networkCodes.has(link.code)) ||
      (link instanceof AggregateError && link.errors.some(isDatabaseUnavailable)),
  );
}

function causes(error: unknown): Error[] {
  const chain: Error[] = [];
  let link = error;
  while (link instanceof Error && !chain.includes(link)) {
    chain.push(link);
    link = link.cause;
  }
  return chain;
}

function isFaultCode(code: string): code is keyof typeof faultKinds {
  return Object.hasOwn(faultKinds, code);
}
