import { Failure } from './say.mjs';

function requireTogether(env, first, others) {
  const missing = others.filter((name) => !env[name]);
  if (env[first] && missing.length > 0) {
    throw new Failure(
      `${first} is set but ${missing.join(' and ')} is not: set it too, or unset ${first} to use the local stand-in.`,
    );
  }
}

function readPort(text) {
  const port = Number(text);
  if (!Number.isInteger(port) || port < 1 || port > 65535) {
    throw new Failure(
      `PORT is "${text}", which is no port: set it to a number from 1 to 65535, or unset it.`,
    );
  }
  return port;
}

/**
 * Decides from the settings what runs here and what is elsewhere: a service that is named is used, and
 * its stand-in is not started. Pure, so that it can be tested.
 */
export function planServices(env) {
  requireTogether(env, 'DATABASE_URL', ['DATABASE_OWNER_URL']);
  requireTogether(env, 'OIDC_ISSUER', ['OIDC_CLIENT_ID', 'OIDC_CLIENT_SECRET']);
  for (const name of [
    'DATABASE_URL',
    'DATABASE_OWNER_URL',
    'REDIS_URL',
    'OIDC_ISSUER',
    'SMTP_URL',
    'PUBLIC_URL',
  ]) {
    if (env[name] && !URL.canParse(env[name])) {
      throw new Failure(`${name} is "${env[name]}", which is no address: correct it or unset it.`);
    }
  }
  return {
    ownsDatabase: !env.DATABASE_URL,
    ownsIdentity: !env.OIDC_ISSUER,
    ownsMail: !env.SMTP_URL,
    loadsDemo: env.DATABASE_URL ? env.MILLPOND_DEMO === 'true' : env.MILLPOND_DEMO !== 'false',
    apiPort: env.PORT ? readPort(env.PORT) : null,
  };
}

/** The environment of every child, from the plan, the kept ports and secrets, and what was set. */
export function childEnvironment({ env, plan, ports, secrets, addresses, folder, people }) {
  const apiPort = plan.apiPort ?? ports.api;
  const publicUrl = env.PUBLIC_URL ?? `http://127.0.0.1:${apiPort}`;
  const shared = {
    ...env,
    NODE_ENV: env.NODE_ENV ?? 'production',
    HOST: '127.0.0.1',
    PORT: String(apiPort),
    PUBLIC_URL: publicUrl,
    ORGANISATION: env.ORGANISATION ?? (plan.loadsDemo ? 'Larkfen Cells' : 'Millpond'),
    DATABASE_URL: env.DATABASE_URL ?? addresses.app,
    SESSION_SECRET: env.SESSION_SECRET ?? secrets.session,
    OIDC_ISSUER: env.OIDC_ISSUER ?? `http://127.0.0.1:${ports.identity}`,
    OIDC_CLIENT_ID: env.OIDC_CLIENT_ID ?? 'millpond',
    OIDC_CLIENT_SECRET: env.OIDC_CLIENT_SECRET ?? secrets.oidcClient,
    OIDC_STAND_IN: String(plan.ownsIdentity),
    OIDC_PROVIDER_KEY: env.OIDC_PROVIDER_KEY ?? (plan.ownsIdentity ? 'local' : 'main'),
    SMTP_URL: env.SMTP_URL ?? `smtp://127.0.0.1:${ports.smtp}`,
    MAIL_FROM: env.MAIL_FROM ?? 'millpond@larkfen.example',
    MAIL_STAND_IN_URL: plan.ownsMail ? `http://127.0.0.1:${ports.mail}` : '',
    LOG_LEVEL: env.LOG_LEVEL ?? 'info',
    DEMO_PEOPLE: plan.ownsIdentity ? JSON.stringify(people) : '[]',
  };
  delete shared.DATABASE_OWNER_URL;
  const owner = { ...shared, DATABASE_OWNER_URL: env.DATABASE_OWNER_URL ?? addresses.owner };
  const standIns = {
    ...env,
    OIDC_CLIENT_ID: shared.OIDC_CLIENT_ID,
    OIDC_CLIENT_SECRET: shared.OIDC_CLIENT_SECRET,
    STAND_IN_APP_URLS: [publicUrl, `http://127.0.0.1:${ports.vite}`].join(','),
    STAND_IN_COOKIE_KEY: secrets.standInCookie,
    ...(plan.ownsIdentity ? { STAND_IN_IDENTITY_PORT: String(ports.identity) } : {}),
    ...(plan.ownsMail
      ? {
          STAND_IN_SMTP_PORT: String(ports.smtp),
          STAND_IN_MAIL_PORT: String(ports.mail),
          STAND_IN_MAIL_FOLDER: `${folder}/mail`,
        }
      : {}),
  };
  return { shared, owner, standIns, publicUrl, apiPort };
}
