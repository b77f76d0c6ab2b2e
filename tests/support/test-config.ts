import { loadConfig } from '#server/config.ts';
import type { Config } from '#server/config.ts';

/** The least a server needs; tests name what matters to them. */
export function testEnvironment(changes: Readonly<Record<string, string>> = {}) {
  return {
    NODE_ENV: 'test',
    PORT: '0',
    PUBLIC_URL: 'http://127.0.0.1:4300',
    DATABASE_URL: 'postgres://nobody@127.0.0.1:1/none',
    SESSION_SECRET: 'a secret for tests, long enough to be taken',
    OIDC_ISSUER: 'http://127.0.0.1:1',
    OIDC_CLIENT_ID: 'millpond',
    OIDC_CLIENT_SECRET: 'secret',
    OIDC_STAND_IN: 'true',
    OIDC_PROVIDER_KEY: 'local',
    SMTP_URL: 'smtp://127.0.0.1:1',
    MAIL_FROM: 'millpond@example.org',
    LOG_LEVEL: 'silent',
    ...changes,
  };
}

export function testConfig(changes: Readonly<Record<string, string>> = {}): Config {
  return loadConfig(testEnvironment(changes));
}
