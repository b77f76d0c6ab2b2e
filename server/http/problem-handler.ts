import type { NextFunction, Request, Response } from 'express';
import { isDatabaseUnavailable } from '#server/db/db-errors.ts';
import type { Log } from '#server/log.ts';
import { problem, ProblemError } from '#server/problem.ts';
import { problemDocument } from './problem-document.ts';
import { scopeOf } from './request-scope.ts';

/** Answers every error as an RFC 9457 document; what is not expected is logged in full and told to nobody. */
export function problemHandler(log: Log) {
  return (error: unknown, request: Request, response: Response, next: NextFunction): void => {
    const { requestId, actorId, contract } = scopeOf(request);
    const expected = translate(error);
    if (!(expected instanceof ProblemError)) {
      log.error({ requestId, actorId, contract, err: error }, 'request failed');
    } else if (expected.status >= 500) {
      log.warn({ requestId, actorId, contract, err: expected.cause ?? expected }, 'unavailable');
    }
    if (response.headersSent) {
      next(error);
      return;
    }
    const body = problemDocument(expected, requestId);
    response
      .status(body.status)
      .set('Cache-Control', 'no-store')
      .type('application/problem+json')
      .send(JSON.stringify(body));
  };
}

/** Turns faults of the layers below (body parser, database, router) into problems where they are known. */
function translate(error: unknown): unknown {
  if (error instanceof ProblemError || !(error instanceof Error)) {
    return error;
  }
  if (isDatabaseUnavailable(error)) {
    return problem('service.unavailable', {
      detail: 'The database does not answer. Wait a minute and try again.',
      cause: error,
    });
  }
  return translateReadingFault(error);
}

function translateReadingFault(error: Error): unknown {
  const kind = 'type' in error ? error.type : undefined;
  if (kind === 'entity.too.large') {
    return problem('input.too-large', {
      detail: 'What you sent is larger than the server takes. Send less at once.',
    });
  }
  if (typeof kind === 'string' && /^(entity|encoding|charset|request)\./.test(kind)) {
    return problem('input.malformed', {
      detail: 'The body of the request could not be read. Send valid JSON in UTF-8.',
    });
  }
  if (error instanceof URIError) {
    return problem('input.malformed', { detail: 'The address is not a valid one.' });
  }
  return error;
}
