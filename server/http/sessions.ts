import connectPgSimple from 'connect-pg-simple';
import session from 'express-session';
import type { Store } from 'express-session';
import type pg from 'pg';
import type { Config } from '#server/config.ts';
import type { Log } from '#server/log.ts';
import './session-data.ts';

export const sessionCookie = 'millpond_session';
const lifetimeMs = 12 * 3600 * 1000;

/** Sessions in PostgreSQL, so that every server process knows them and a restart ends none. */
export function createSessionStore(pool: pg.Pool, log: Log): Store & { close(): void } {
  const PostgresStore = connectPgSimple(session);
  return new PostgresStore({
    pool,
    tableName: 'session',
    createTableIfMissing: false,
    pruneSessionInterval: 900,
    errorLog: (...faults: unknown[]) => {
      log.warn({ err: faults.find((fault) => fault instanceof Error) }, 'session store');
    },
  });
}

/** Twelve hours from the last call on; the cookie is useless to scripts and other sites. */
export function sessions(config: Config, store: Store) {
  return session({
    name: sessionCookie,
    secret: config.session.secret,
    store,
    resave: false,
    saveUninitialized: false,
    rolling: true,
    proxy: config.session.isSecure,
    cookie: {
      httpOnly: true,
      sameSite: 'lax',
      secure: config.session.isSecure,
      maxAge: lifetimeMs,
      path: '/',
    },
  });
}
