import type { NextFunction, Request, Response } from 'express';
import { rateLimit } from 'express-rate-limit';
import { problem } from '#server/problem.ts';
import './session-data.ts';

/**
 * Counters live in the memory of each server process and are lost with it: they slow down guessing and
 * run-away scripts, they are no quota. With n processes the limits are n times as wide.
 */
function limit(options: { windowMs: number; most: number; keyOf: (request: Request) => string }) {
  return rateLimit({
    windowMs: options.windowMs,
    limit: options.most,
    standardHeaders: 'draft-7',
    legacyHeaders: false,
    keyGenerator: options.keyOf,
    validate: { keyGeneratorIpFallback: false },
    handler: (_request: Request, _response: Response, next: NextFunction) => {
      next(
        problem('rate.exceeded', {
          detail: 'That was too many requests in a short time. Wait a minute, then go on.',
        }),
      );
    },
  });
}

export function signInLimit() {
  return limit({ windowMs: 60_000, most: 60, keyOf: (request) => request.ip ?? 'unknown' });
}

/** Changes are counted by person, so that colleagues behind one address do not share a limit. */
export function writeLimit() {
  const counted = limit({ windowMs: 60_000, most: 300, keyOf: callerOf });
  return (request: Request, response: Response, next: NextFunction): void => {
    if (request.method === 'GET' || request.method === 'HEAD') {
      next();
    } else {
      void counted(request, response, next);
    }
  };
}

function callerOf(request: Request): string {
  const { personId } = request.session;
  return personId === undefined ? `address ${request.ip ?? 'unknown'}` : `person ${personId}`;
}
