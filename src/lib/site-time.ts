import { DateTime } from 'luxon';

const inputPattern = "yyyy-MM-dd'T'HH:mm";

export type SiteTimeReading =
  | { readonly kind: 'instant'; readonly at: string; readonly isRepeated: boolean }
  | { readonly kind: 'empty' }
  | { readonly kind: 'invalid' }
  /** The clock jumps over this wall time. */
  | { readonly kind: 'gap' };

/** What a `datetime-local` field shows for an instant, in the site's zone. */
export function toSiteInput(instant: string | number, zone: string): string {
  const moment =
    typeof instant === 'number'
      ? DateTime.fromMillis(instant, { zone })
      : DateTime.fromISO(instant, { zone });
  return moment.isValid ? moment.toFormat(inputPattern) : '';
}

/**
 * Reads a `datetime-local` value as wall time at the site and gives the instant as ISO 8601 UTC.
 * Where the clock is put back the wall time happens twice: the earlier one is meant.
 */
export function fromSiteInput(value: string, zone: string): SiteTimeReading {
  if (value === '') {
    return { kind: 'empty' };
  }
  const read = DateTime.fromISO(value, { zone });
  if (!read.isValid) {
    return { kind: 'invalid' };
  }
  if (read.toFormat(inputPattern) !== value.slice(0, 16)) {
    return { kind: 'gap' };
  }
  const candidates = read.getPossibleOffsets().map((moment) => moment.toMillis());
  const earliest = DateTime.fromMillis(Math.min(...candidates), { zone: 'utc' });
  const at = earliest.toISO();
  return at === null
    ? { kind: 'invalid' }
    : { kind: 'instant', at, isRepeated: candidates.length > 1 };
}
