import { randomUUID } from 'node:crypto';
import type { NextFunction, Request, Response } from 'express';
import type { Log } from '#server/log.ts';

/** What travels with one request: its number, and for the log who called what. */
type RequestScope = { readonly requestId: string; actorId: number | null; contract: string | null };

const scopes = new WeakMap<Request, RequestScope>();

/** The scope of a request; it is there from the first middleware on. */
export function scopeOf(request: Request): RequestScope {
  const scope = scopes.get(request);
  if (scope === undefined) {
    throw new Error('This request passed no request log.');
  }
  return scope;
}

/**
 * Numbers each request and writes one line when it is answered. The line names the contract, not the
 * address, because addresses can carry what people typed.
 */
export function requestLog(log: Log) {
  return (request: Request, response: Response, next: NextFunction): void => {
    const scope: RequestScope = { requestId: randomUUID(), actorId: null, contract: null };
    const startedAt = performance.now();
    scopes.set(request, scope);
    response.setHeader('X-Request-Id', scope.requestId);
    response.on('close', () => {
      const line = {
        requestId: scope.requestId,
        actorId: scope.actorId,
        method: request.method,
        contract: scope.contract,
        status: response.statusCode,
        isComplete: response.writableFinished,
        durationMs: Math.round(performance.now() - startedAt),
      };
      if (scope.contract === null && response.statusCode < 400) {
        log.debug(line, 'request');
      } else {
        log.info(line, 'request');
      }
    });
    next();
  };
}
