import { systemClock } from './clock.ts';
import type { Clock } from './clock.ts';
import type { Config } from './config.ts';
import { connectDatabase } from './db/client.ts';
import type { Database, Reader, Transact } from './db/client.ts';
import { createIdentityProvider } from './integrations/identity.ts';
import type { IdentityProvider } from './integrations/identity.ts';
import { createMailer } from './integrations/mail.ts';
import type { Mailer } from './integrations/mail.ts';
import { createLog } from './log.ts';
import type { Log } from './log.ts';

/**
 * Everything a service can need from outside. A service names its part of it:
 * `createRequest(deps: Pick<Deps, 'clock' | 'transact'>, …)`.
 */
export type Deps = {
  readonly config: Config;
  readonly clock: Clock;
  readonly log: Log;
  /** Number of the call or job being served, for audit, outbox and log; null outside of one. */
  readonly requestId: string | null;
  /** Reads; inside an idempotent call through the call's own transaction. Writing takes `transact`. */
  readonly db: Reader;
  readonly transact: Transact;
  readonly identity: IdentityProvider;
  readonly mail: Mailer;
};

export type Resources = {
  readonly deps: Deps;
  readonly database: Database;
  readonly close: () => Promise<void>;
};

/** What tests put in place of the real thing. */
export type Replacements = Partial<Pick<Deps, 'clock' | 'log' | 'identity' | 'mail'>>;

/** Builds everything from the settings. Nothing connects before it is first used. */
export function buildDeps(config: Config, replacements: Replacements = {}): Resources {
  const log = replacements.log ?? createLog(config.logLevel);
  const database = connectDatabase({
    url: config.database.url,
    onRetry: (error, attempt) => {
      log.info({ err: error, attempt }, 'transaction run again');
    },
    onIdleError: (error) => {
      log.warn({ err: error }, 'database connection lost');
    },
  });
  const mail = replacements.mail ?? createMailer(config.mail);
  const deps: Deps = {
    config,
    clock: replacements.clock ?? systemClock,
    log,
    requestId: null,
    db: database.db,
    transact: database.transact,
    identity: replacements.identity ?? createIdentityProvider(config),
    mail,
  };
  return {
    deps,
    database,
    async close() {
      mail.close();
      await database.close();
    },
  };
}
