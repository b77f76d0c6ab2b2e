import { z } from 'zod';

/** Record numbers people say aloud: booking 2418, request 1187. */
export const recordNumber = z.int().positive();
/** The same in a path or query, where everything arrives as text. */
export const recordNumberText = z.coerce.number().int().positive();

export const instant = z.iso.datetime({ offset: true });
export const calendarDay = z.iso.date();
export const siteCode = z
  .string()
  .regex(/^[a-z][a-z0-9-]{1,30}$/, 'a site code is lower-case letters, digits and hyphens');
export const tag = z.string().regex(/^[A-Z]\d{2,3}$/, 'a tag is a letter and a number, like C03');
/** Row version as last seen; an update that names an old one is refused with the current row. */
export const rowVersion = z.int().min(1);
export const noteText = z.string().trim().max(2000);
export const reasonText = z
  .string()
  .trim()
  .min(3, 'give a reason of at least three letters')
  .max(1000);
export const finite = z.number();

export const noQuery = z.strictObject({});
export const noBody = z.undefined();
export const siteParams = z.strictObject({ site: siteCode });
export const siteRecordParams = z.strictObject({ site: siteCode, id: recordNumberText });
export const siteTagParams = z.strictObject({ site: siteCode, tag });

export const personRef = z.object({ id: recordNumber, name: z.string() });
export type PersonRef = z.infer<typeof personRef>;

/** Cursor paging: the cursor is opaque and valid for the sort it came with. */
export const defaultPageSize = 50;
export const pageQuery = {
  cursor: z.string().max(400).exactOptional(),
  limit: z.coerce.number().int().min(1).max(200).exactOptional(),
};
export function pageOf<Item extends z.ZodType>(item: Item) {
  return z.object({ items: z.array(item), nextCursor: z.string().nullable() });
}

/** A list in a query string: `state=draft,submitted`. */
export function listOf<const Values extends readonly [string, ...string[]]>(values: Values) {
  return z
    .string()
    .transform((text) => text.split(',').filter((part) => part !== ''))
    .pipe(z.array(z.enum(values)).max(values.length));
}
/** `true` or `false` in a query string. */
export const flagText = z.enum(['true', 'false']).transform((text) => text === 'true');
