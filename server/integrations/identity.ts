import * as client from 'openid-client';
import { z } from 'zod';
import type { Config } from '#server/config.ts';
import { problem } from '#server/problem.ts';

/** What is kept in the session between leaving for the provider and coming back. */
export type SignInAttempt = {
  readonly state: string;
  readonly nonce: string;
  readonly codeVerifier: string;
};
export type Identity = {
  readonly sub: string;
  readonly name: string;
  readonly email: string | null;
  readonly roles: readonly string[];
  readonly idToken: string;
};

/** The OpenID Connect provider, as far as Millpond uses it. */
export interface IdentityProvider {
  startSignIn(loginHint: string | null): Promise<{ url: string; attempt: SignInAttempt }>;
  finishSignIn(callbackUrl: URL, attempt: SignInAttempt): Promise<Identity>;
  /** Where to send the browser to end the provider's own session, if the provider can. */
  endSessionUrl(idToken: string | null): Promise<string | null>;
}

const claimsSchema = z.looseObject({
  sub: z.string().min(1),
  name: z.string().min(1).optional(),
  preferred_username: z.string().min(1).optional(),
  email: z.string().optional(),
  roles: z.union([z.array(z.string()), z.string().transform((role) => [role])]).optional(),
});

/** Authorization code with PKCE, state and nonce; the provider is looked up at the first use. */
export function createIdentityProvider(config: Config): IdentityProvider {
  const discover = lazyDiscovery(config.oidc);
  const callback = `${config.publicUrl}/auth/callback`;
  return {
    async startSignIn(loginHint) {
      const provider = await discover();
      const attempt = {
        state: client.randomState(),
        nonce: client.randomNonce(),
        codeVerifier: client.randomPKCECodeVerifier(),
      };
      const url = client.buildAuthorizationUrl(provider, {
        redirect_uri: callback,
        scope: 'openid profile email roles',
        state: attempt.state,
        nonce: attempt.nonce,
        code_challenge: await client.calculatePKCECodeChallenge(attempt.codeVerifier),
        code_challenge_method: 'S256',
        ...(loginHint === null ? {} : { login_hint: loginHint }),
      });
      return { url: url.href, attempt };
    },
    async finishSignIn(callbackUrl, attempt) {
      const provider = await discover();
      const tokens = await client
        .authorizationCodeGrant(provider, callbackUrl, {
          pkceCodeVerifier: attempt.codeVerifier,
          expectedState: attempt.state,
          expectedNonce: attempt.nonce,
          idTokenExpected: true,
        })
        .catch(translateGrantError);
      const claims = tokens.claims();
      if (claims === undefined || tokens.id_token === undefined) {
        throw signInFailed(new Error('the provider sent no id token'));
      }
      const info =
        provider.serverMetadata().userinfo_endpoint === undefined
          ? {}
          : await client
              .fetchUserInfo(provider, tokens.access_token, claims.sub)
              .catch(translateGrantError);
      return identityOf({ ...claims, ...info }, tokens.id_token);
    },
    async endSessionUrl(idToken) {
      const provider = await discover();
      if (provider.serverMetadata().end_session_endpoint === undefined) {
        return null;
      }
      return client.buildEndSessionUrl(provider, {
        post_logout_redirect_uri: `${config.publicUrl}/`,
        ...(idToken === null ? {} : { id_token_hint: idToken }),
      }).href;
    },
  };
}

function identityOf(claims: unknown, idToken: string): Identity {
  const parsed = claimsSchema.safeParse(claims);
  if (!parsed.success) {
    throw signInFailed(parsed.error);
  }
  const { sub, name, preferred_username: username, email, roles } = parsed.data;
  return { sub, name: name ?? username ?? sub, email: email ?? null, roles: roles ?? [], idToken };
}

/** A failed look-up is forgotten, so that the next person tries again. */
function lazyDiscovery(config: Config['oidc']): () => Promise<client.Configuration> {
  let found: Promise<client.Configuration> | null = null;
  return async () => {
    found ??= client.discovery(
      new URL(config.issuer),
      config.clientId,
      config.clientSecret,
      client.ClientSecretBasic(config.clientSecret),
      // The library looks for this very function, to allow the look-up itself over plain http. It is for
      // the stand-in on this machine only; `loadConfig` refuses it elsewhere.
      // eslint-disable-next-line @typescript-eslint/no-deprecated -- marked so to make it stand out
      { timeout: 10, ...(config.isStandIn ? { execute: [client.allowInsecureRequests] } : {}) },
    );
    try {
      return await found;
    } catch (error) {
      found = null;
      throw unanswered(error);
    }
  };
}

function translateGrantError(error: unknown): never {
  const isRefusal =
    error instanceof client.AuthorizationResponseError ||
    error instanceof client.ResponseBodyError ||
    error instanceof client.ClientError;
  throw isRefusal ? signInFailed(error) : unanswered(error);
}

function unanswered(cause: unknown) {
  return problem('service.unavailable', {
    detail:
      'The sign-in service does not answer. Wait a minute and try again; if it stays so, tell your administrator.',
    cause,
  });
}

function signInFailed(cause: unknown) {
  return problem('session.missing', {
    detail: 'The sign-in was not completed. Start again from the sign-in page.',
    cause,
  });
}
