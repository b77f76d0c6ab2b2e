import { z } from 'zod';

type ProblemDefinition = { readonly status: number; readonly title: string };

/**
 * Every problem the API can answer with (RFC 9457). The code is the last part of `type`
 * (`/problems/<code>`, served as a page) and is what the client switches on.
 */
export const problems = {
  'session.missing': { status: 401, title: 'You are not signed in' },
  'session.csrf': { status: 403, title: 'The page is out of date' },
  'access.refused': { status: 403, title: 'Your roles do not allow this' },
  'not-found': { status: 404, title: 'Not found' },
  'input.invalid': { status: 422, title: 'Some of the input cannot be accepted' },
  'input.malformed': { status: 400, title: 'The request could not be read' },
  'input.too-large': { status: 413, title: 'The input is too large' },
  'idempotency.missing': { status: 400, title: 'The request carries no idempotency key' },
  'idempotency.reused': { status: 409, title: 'The idempotency key was used for another request' },
  'version.stale': { status: 409, title: 'Somebody changed this meanwhile' },
  'rate.exceeded': { status: 429, title: 'Too many requests' },
  'service.unavailable': { status: 503, title: 'A service Millpond needs does not answer' },
  internal: { status: 500, title: 'Something failed on the server' },
  'request.state': { status: 409, title: 'The request is not in a state that allows this' },
  'request.incomplete': { status: 422, title: 'The request is not complete' },
  'offer.expired': { status: 409, title: 'The offer has expired' },
  'offer.policy': { status: 409, title: 'The site lets only schedulers confirm' },
  'booking.clash': { status: 409, title: 'Something is already taken' },
  'booking.checks': { status: 409, title: 'The booking could not give a valid result' },
  'booking.state': { status: 409, title: 'The booking is not in a state that allows this' },
  'booking.horizon': { status: 409, title: 'The slot lies outside the time that can be booked' },
  'load.state': { status: 409, title: 'The load is not in a state that allows this' },
  'calibration.state': { status: 409, title: 'The calibration is not in a state that allows this' },
  'calibration.same-person': { status: 409, title: 'A second person must approve' },
  'calibration.scope': { status: 422, title: 'The calibration does not fit the instrument' },
  'deviation.same-person': { status: 409, title: 'Another person must decide' },
  'deviation.not-liftable': { status: 409, title: 'This rule cannot be lifted' },
  'instrument.state': { status: 409, title: 'The instrument is not in a state that allows this' },
  'file.type': { status: 422, title: 'The file type is not accepted' },
  'file.too-large': { status: 413, title: 'The file is too large' },
  'file.incomplete': { status: 409, title: 'The file has not arrived whole' },
  'person.self': { status: 409, title: 'This cannot be done to yourself' },
  'person.claim': { status: 409, title: 'This role is managed by the identity provider' },
} as const satisfies Record<string, ProblemDefinition>;

export type ProblemCode = keyof typeof problems;

export function isProblemCode(value: string): value is ProblemCode {
  return Object.hasOwn(problems, value);
}

/** The wire form; `errors` names every fault of the input with a JSON pointer. */
export const problemSchema = z.looseObject({
  type: z.string(),
  title: z.string(),
  status: z.number().int(),
  detail: z.string(),
  instance: z.string(),
  code: z.string().refine(isProblemCode),
  errors: z.array(z.object({ detail: z.string(), pointer: z.string() })).exactOptional(),
});
export type ProblemDocument = z.infer<typeof problemSchema>;
