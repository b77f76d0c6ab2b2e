import { randomBytes } from 'node:crypto';
import type { ServerResponse } from 'node:http';
import type { NextFunction, Request, Response } from 'express';
import helmet from 'helmet';
import type { Config } from '#server/config.ts';

const nonces = new WeakMap<ServerResponse, string>();

/**
 * The nonce under which this page's style elements may apply. The calendar adds one style element at
 * run time and reads the nonce from the page, so no inline style has to be allowed in general.
 */
export function styleNonceOf(response: Response): string {
  const nonce = nonces.get(response);
  if (nonce === undefined) {
    throw new Error('This response passed no security headers.');
  }
  return nonce;
}

export function giveStyleNonce(_request: Request, response: Response, next: NextFunction): void {
  nonces.set(response, randomBytes(16).toString('base64'));
  next();
}

/** Scripts from our own files only, no eval, no frames; https is forced where the address says so. */
export function securityHeaders(config: Config) {
  const isSecure = config.session.isSecure;
  return helmet({
    contentSecurityPolicy: {
      useDefaults: false,
      directives: {
        defaultSrc: ["'self'"],
        scriptSrc: ["'self'"],
        scriptSrcAttr: ["'none'"],
        styleSrc: ["'self'", (_request, response) => `'nonce-${nonces.get(response) ?? ''}'`],
        imgSrc: ["'self'", 'data:'],
        fontSrc: ["'self'", 'data:'],
        connectSrc: ["'self'"],
        objectSrc: ["'none'"],
        baseUri: ["'none'"],
        frameAncestors: ["'none'"],
        formAction: ["'self'", new URL(config.oidc.issuer).origin],
        ...(isSecure ? { upgradeInsecureRequests: [] } : {}),
      },
    },
    strictTransportSecurity: isSecure ? { maxAge: 31_536_000 } : false,
    crossOriginOpenerPolicy: isSecure ? { policy: 'same-origin' } : false,
    originAgentCluster: false,
    referrerPolicy: { policy: 'same-origin' },
    xFrameOptions: { action: 'deny' },
  });
}
