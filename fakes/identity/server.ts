/**
 * Stand-in for an organisation's OpenID Connect provider: authorization code with PKCE, one
 * confidential client, invented people who sign in with one click. A real protocol server on
 * loopback; it signs anybody in and must never be reachable from elsewhere.
 */
import { randomBytes } from 'node:crypto';
import { createServer, type IncomingMessage, type Server, type ServerResponse } from 'node:http';
import Provider, { type Configuration, type errors as ProviderErrors } from 'oidc-provider';
import { choosePage, messagePage, signOutPage, styleSheet } from './pages.ts';
import { demoPeople, type StandInPerson } from './people.ts';

export type IdentityStandInOptions = {
  readonly port: number;
  readonly clientId: string;
  readonly clientSecret: string;
  readonly redirectUris: readonly string[];
  readonly postLogoutRedirectUris: readonly string[];
  readonly people?: readonly StandInPerson[];
  /** Signs the cookies; give a stable one so that a restart keeps sessions' cookies readable. */
  readonly cookieKey?: string;
};
export type IdentityStandIn = {
  readonly url: string;
  readonly close: () => Promise<void>;
};

function buildConfiguration(
  options: IdentityStandInOptions,
  people: readonly StandInPerson[],
): Configuration {
  return {
    clients: [
      {
        client_id: options.clientId,
        client_secret: options.clientSecret,
        redirect_uris: [...options.redirectUris],
        post_logout_redirect_uris: [...options.postLogoutRedirectUris],
        response_types: ['code'],
        grant_types: ['authorization_code'],
        token_endpoint_auth_method: 'client_secret_basic',
      },
    ],
    pkce: { required: () => true },
    conformIdTokenClaims: false,
    claims: { openid: ['sub'], profile: ['name'], email: ['email'], roles: ['roles'] },
    scopes: ['openid', 'profile', 'email', 'roles'],
    cookies: {
      keys: [options.cookieKey ?? randomBytes(24).toString('hex')],
      names: {
        session: 'stand_in_session',
        interaction: 'stand_in_interaction',
        resume: 'stand_in_resume',
      },
    },
    interactions: { url: (_context, interaction) => `/interaction/${interaction.uid}` },
    features: {
      devInteractions: { enabled: false },
      rpInitiatedLogout: {
        enabled: true,
        logoutSource: (context, form) => {
          context.body = signOutPage(form);
        },
        postLogoutSuccessSource: (context) => {
          context.body = messagePage('Signed out', 'The session at the stand-in has ended.');
        },
      },
    },
    renderError: (context, out) => {
      context.type = 'html';
      context.body = messagePage(
        'This sign-in cannot go on',
        `${out.error_description ?? out.error} Go back to Millpond and start again.`,
      );
    },
    ttl: {
      Session: 12 * 3600,
      Interaction: 3600,
      Grant: 12 * 3600,
      IdToken: 3600,
      AccessToken: 3600,
    },
    findAccount: (_context, sub) => {
      const found = people.find((entry) => entry.sub === sub);
      return found === undefined
        ? undefined
        : {
            accountId: sub,
            claims: () => ({
              sub,
              name: found.name,
              email: found.email,
              roles: [...found.roles],
            }),
          };
    },
  };
}

async function readForm(request: IncomingMessage): Promise<URLSearchParams> {
  let text = '';
  for await (const piece of request) {
    text += String(piece);
    if (text.length > 4096) {
      throw new Error('The form is too large.');
    }
  }
  return new URLSearchParams(text);
}

function answer(response: ServerResponse, status: number, type: string, body: string): void {
  response.writeHead(status, {
    'content-type': `${type}; charset=utf-8`,
    'cache-control': 'no-store',
    'content-security-policy': "default-src 'none'; style-src 'self'",
  });
  response.end(body);
}

/** Finishes a sign-in for a person: account, and consent to everything that was asked. */
async function signIn(
  provider: Provider,
  request: IncomingMessage,
  response: ServerResponse,
  sub: string,
): Promise<void> {
  const details = await provider.interactionDetails(request, response);
  const clientId = details.params['client_id'];
  const scope = details.params['scope'];
  const grant = new provider.Grant({
    accountId: sub,
    ...(typeof clientId === 'string' ? { clientId } : {}),
  });
  grant.addOIDCScope(typeof scope === 'string' ? scope : 'openid');
  const grantId = await grant.save();
  await provider.interactionFinished(
    request,
    response,
    { login: { accountId: sub }, consent: { grantId } },
    { mergeWithLastSubmission: false },
  );
}

async function interact(
  provider: Provider,
  people: readonly StandInPerson[],
  request: IncomingMessage,
  response: ServerResponse,
): Promise<void> {
  const details = await provider.interactionDetails(request, response);
  const hint = details.params['login_hint'];
  if (request.method === 'POST') {
    const sub = (await readForm(request)).get('sub');
    if (sub === null || !people.some((entry) => entry.sub === sub)) {
      answer(
        response,
        400,
        'text/html',
        messagePage('Nobody chosen', 'Go back and choose a person.'),
      );
      return;
    }
    await signIn(provider, request, response, sub);
    return;
  }
  if (typeof hint === 'string' && people.some((entry) => entry.sub === hint)) {
    await signIn(provider, request, response, hint);
    return;
  }
  if (details.prompt.name === 'consent' && details.session?.accountId !== undefined) {
    await signIn(provider, request, response, details.session.accountId);
    return;
  }
  answer(response, 200, 'text/html', choosePage(details.uid, people));
}

function isProviderError(error: unknown): error is ProviderErrors.OIDCProviderError {
  return error instanceof Error && 'error_description' in error;
}

function listen(server: Server, port: number): Promise<number> {
  return new Promise((resolve, reject) => {
    server.once('error', reject);
    server.listen(port, '127.0.0.1', () => {
      const address = server.address();
      resolve(typeof address === 'object' && address !== null ? address.port : port);
    });
  });
}

/** Starts the stand-in on loopback; port 0 takes a free one. */
export async function start(options: IdentityStandInOptions): Promise<IdentityStandIn> {
  const people = options.people ?? demoPeople;
  const server = createServer();
  const port = await listen(server, options.port);
  const url = `http://127.0.0.1:${port}`;
  const provider = new Provider(url, buildConfiguration(options, people));
  const handleProtocol = provider.callback();
  server.on('request', (request, response) => {
    const path = new URL(request.url ?? '/', url).pathname;
    if (path === '/stand-in.css') {
      answer(response, 200, 'text/css', styleSheet);
      return;
    }
    if (!path.startsWith('/interaction/')) {
      void handleProtocol(request, response);
      return;
    }
    interact(provider, people, request, response).catch((error: unknown) => {
      const sentence = isProviderError(error)
        ? 'This sign-in was started too long ago or in another browser. Go back to Millpond and start again.'
        : 'The stand-in failed. Start it again.';
      answer(
        response,
        isProviderError(error) ? 400 : 500,
        'text/html',
        messagePage('This sign-in cannot go on', sentence),
      );
    });
  });
  return {
    url,
    close: () =>
      new Promise((resolve) => {
        server.close(() => {
          resolve();
        });
        server.closeAllConnections();
      }),
  };
}
