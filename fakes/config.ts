/** Settings of the stand-ins when they run by themselves; the launcher sets them. */
export type StandInSettings = {
  readonly identity: {
    readonly port: number;
    readonly clientId: string;
    readonly clientSecret: string;
    readonly redirectUris: readonly string[];
    readonly postLogoutRedirectUris: readonly string[];
    readonly cookieKey: string;
  } | null;
  readonly mail: {
    readonly smtpPort: number;
    readonly httpPort: number;
    readonly folder: string | null;
  } | null;
};

export function loadStandInSettings(): StandInSettings {
  const env = process.env;
  const identityPort = env['STAND_IN_IDENTITY_PORT'];
  const smtpPort = env['STAND_IN_SMTP_PORT'];
  const appUrls = (env['STAND_IN_APP_URLS'] ?? '').split(',').filter((url) => url !== '');
  return {
    identity:
      identityPort === undefined
        ? null
        : {
            port: Number(identityPort),
            clientId: env['OIDC_CLIENT_ID'] ?? '',
            clientSecret: env['OIDC_CLIENT_SECRET'] ?? '',
            redirectUris: appUrls.map((url) => `${url}/auth/callback`),
            postLogoutRedirectUris: appUrls.map((url) => `${url}/`),
            cookieKey: env['STAND_IN_COOKIE_KEY'] ?? '',
          },
    mail:
      smtpPort === undefined
        ? null
        : {
            smtpPort: Number(smtpPort),
            httpPort: Number(env['STAND_IN_MAIL_PORT'] ?? '0'),
            folder: env['STAND_IN_MAIL_FOLDER'] ?? null,
          },
  };
}
