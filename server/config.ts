import { z } from 'zod';

const loopback = /^(127\.0\.0\.1|localhost|\[::1\])$/;
const webAddress = z.url({ protocol: /^https?$/, error: 'must be an http or https address' });
const flag = z.enum(['true', 'false'], { error: 'must be true or false' }).default('false');

function seconds(fallback: number) {
  return z.coerce
    .number({ error: 'must be a number of seconds' })
    .min(0.5, 'must be at least 0.5')
    .max(3600, 'must be at most 3600')
    .default(fallback);
}

const demoPersonSchema = z.strictObject({
  sub: z.string().min(1),
  name: z.string().min(1),
  role: z.string(),
  site: z.string().optional(),
  note: z.string().optional(),
});
const demoPeopleSchema = z
  .string()
  .default('[]')
  .transform((text, context) => {
    try {
      const parsed: unknown = JSON.parse(text);
      return parsed;
    } catch {
      context.addIssue({ code: 'custom', message: 'must be a JSON list' });
      return z.NEVER;
    }
  })
  .pipe(z.array(demoPersonSchema));

/** Every setting of the server and the worker; `.env.example` is written from the descriptions. */
export const environmentSchema = z.object({
  NODE_ENV: z
    .enum(['development', 'test', 'production'])
    .default('production')
    .describe('development and test check every response against its contract'),
  HOST: z.string().min(1).default('127.0.0.1').describe('address the server listens on'),
  PORT: z.coerce
    .number({ error: 'must be a number' })
    .int()
    .min(0)
    .max(65535)
    .default(4300)
    .describe('port the server listens on; 0 takes any free one'),
  PUBLIC_URL: webAddress.describe('address people open in the browser, without a path'),
  ORGANISATION: z
    .string()
    .min(1)
    .default('Millpond')
    .describe('name of the laboratory or company, shown on every page'),
  DATABASE_URL: z
    .url({ protocol: /^postgres(ql)?$/, error: 'must be a postgres:// address' })
    .describe('PostgreSQL address of the runtime role, not of the owner'),
  SESSION_SECRET: z
    .string({ error: 'is missing' })
    .min(32, 'must have at least 32 characters')
    .describe('signs the session cookie; at least 32 random characters'),
  OIDC_ISSUER: webAddress.describe('address of the OpenID Connect provider'),
  OIDC_CLIENT_ID: z
    .string({ error: 'is missing' })
    .min(1)
    .describe('client id registered with the provider'),
  OIDC_CLIENT_SECRET: z
    .string({ error: 'is missing' })
    .min(1)
    .describe('client secret registered with the provider'),
  OIDC_STAND_IN: flag.describe(
    'true only for the local stand-in: plain http on loopback, sign-in by one click',
  ),
  OIDC_PROVIDER_KEY: z
    .string()
    .regex(/^[a-z][a-z0-9-]*$/, 'must be lower-case letters, digits and hyphens')
    .default('main')
    .describe('short stable name of the provider; people are known by it and their subject'),
  SMTP_URL: z
    .url({ protocol: /^smtps?$/, error: 'must be an smtp:// or smtps:// address' })
    .describe('mail server that takes outgoing mail'),
  MAIL_FROM: z.email({ error: 'must be a mail address' }).describe('sender of every mail'),
  MAIL_PATIENCE_S: seconds(60).describe(
    'seconds the mail server may take over one mail before it is given up and tried again',
  ),
  MAIL_STAND_IN_URL: webAddress
    .optional()
    .describe('where the mail stand-in shows what was sent; leave empty outside a demo'),
  REDIS_URL: z
    .url({ protocol: /^rediss?$/, error: 'must be a redis:// address' })
    .optional()
    .describe('carries the job queue in Redis; without it the queue lives in PostgreSQL'),
  JOB_LOCK_S: seconds(30).describe(
    'seconds after which the job of a worker that gives no sign of life goes to another',
  ),
  LOG_LEVEL: z
    .enum(['fatal', 'error', 'warn', 'info', 'debug', 'silent'])
    .default('info')
    .describe('least severe log line that is written'),
  DEMO_PEOPLE: demoPeopleSchema.describe(
    'JSON list of {sub, name, role, site, note} shown on the sign-in page of a demo',
  ),
});

export type DemoPerson = z.infer<typeof demoPersonSchema>;

/** The settings, parsed once, nested by topic and frozen. */
export type Config = {
  readonly mode: 'development' | 'test' | 'production';
  readonly host: string;
  readonly port: number;
  readonly publicUrl: string;
  readonly organisation: string;
  readonly logLevel: string;
  readonly database: { readonly url: string };
  readonly session: { readonly secret: string; readonly isSecure: boolean };
  readonly oidc: {
    readonly issuer: string;
    readonly clientId: string;
    readonly clientSecret: string;
    readonly isStandIn: boolean;
    readonly providerKey: string;
    readonly demoPeople: readonly DemoPerson[];
  };
  readonly mail: {
    readonly smtpUrl: string;
    readonly from: string;
    readonly patienceMs: number;
    readonly standInUrl: string | null;
  };
  readonly jobs: { readonly lockMs: number };
  readonly redisUrl: string | null;
};

export class ConfigError extends Error {
  override readonly name = 'ConfigError';
}

/** Parses the settings; a fault stops the process, and every fault is named, not just the first. */
export function loadConfig(env: Readonly<Record<string, string | undefined>>): Config {
  const given = Object.fromEntries(Object.entries(env).filter(([, value]) => value !== ''));
  const parsed = environmentSchema.safeParse(given);
  if (!parsed.success) {
    throw new ConfigError(faultList(parsed.error.issues, given));
  }
  const values = parsed.data;
  const issuer = new URL(values.OIDC_ISSUER);
  if (values.OIDC_STAND_IN === 'true' && !loopback.test(issuer.hostname)) {
    throw new ConfigError(
      'The settings cannot be used:\n- OIDC_STAND_IN is true, but OIDC_ISSUER is not on this machine. The stand-in signs anybody in; set OIDC_STAND_IN to false.',
    );
  }
  return freeze(values);
}

/** Reads the settings of this process; the only place that looks at its environment. */
export function loadProcessConfig(): Config {
  return loadConfig(process.env);
}

function freeze(values: z.infer<typeof environmentSchema>): Config {
  return Object.freeze({
    mode: values.NODE_ENV,
    host: values.HOST,
    port: values.PORT,
    publicUrl: new URL(values.PUBLIC_URL).origin,
    organisation: values.ORGANISATION,
    logLevel: values.LOG_LEVEL,
    database: Object.freeze({ url: values.DATABASE_URL }),
    session: Object.freeze({
      secret: values.SESSION_SECRET,
      isSecure: new URL(values.PUBLIC_URL).protocol === 'https:',
    }),
    oidc: Object.freeze({
      issuer: values.OIDC_ISSUER,
      clientId: values.OIDC_CLIENT_ID,
      clientSecret: values.OIDC_CLIENT_SECRET,
      isStandIn: values.OIDC_STAND_IN === 'true',
      providerKey: values.OIDC_PROVIDER_KEY,
      demoPeople: Object.freeze(values.OIDC_STAND_IN === 'true' ? values.DEMO_PEOPLE : []),
    }),
    mail: Object.freeze({
      smtpUrl: values.SMTP_URL,
      from: values.MAIL_FROM,
      patienceMs: values.MAIL_PATIENCE_S * 1000,
      standInUrl: values.MAIL_STAND_IN_URL ?? null,
    }),
    jobs: Object.freeze({ lockMs: values.JOB_LOCK_S * 1000 }),
    redisUrl: values.REDIS_URL ?? null,
  });
}

function faultList(
  issues: readonly z.core.$ZodIssue[],
  given: Readonly<Record<string, string | undefined>>,
): string {
  const lines = issues.map((issue) => {
    const key = String(issue.path[0]);
    const fault = given[key] === undefined ? 'is missing' : issue.message;
    return `- ${key} ${fault} (${describe(key)})`;
  });
  return ['The settings cannot be used:', ...new Set(lines)].join('\n');
}

function describe(key: string): string {
  const field = Object.entries(environmentSchema.shape).find(([name]) => name === key)?.[1];
  return field?.description ?? 'unknown setting';
}
