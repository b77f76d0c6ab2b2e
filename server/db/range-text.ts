/** A half-open span of instants in epoch milliseconds. */
export type InstantSpan = { readonly startMs: number; readonly endMs: number };

/** Writes a span as PostgreSQL reads a tstzrange. */
export function formatRange(span: InstantSpan): string {
  if (!(span.startMs < span.endMs)) {
    throw new RangeError('A span of time must end after it starts.');
  }
  return `[${new Date(span.startMs).toISOString()},${new Date(span.endMs).toISOString()})`;
}

const rangePattern = /^\["?([^",]+)"?,"?([^",]+)"?\)$/;

/** Reads a tstzrange as a session in UTC writes it. */
export function parseRange(text: string): InstantSpan {
  const match = rangePattern.exec(text);
  return { startMs: parseInstant(match?.[1], text), endMs: parseInstant(match?.[2], text) };
}

function parseInstant(part: string | undefined, whole: string): number {
  const instantMs = part === undefined ? NaN : Date.parse(toIso(part));
  if (Number.isNaN(instantMs)) {
    throw new RangeError(`The database sent a span of time that cannot be read: ${whole}`);
  }
  return instantMs;
}

function toIso(part: string): string {
  return part.replace(' ', 'T').replace(/\+00(:00)?$/, 'Z');
}
