import type { SiteScope } from '#server/actor.ts';
import type { Reader } from '#server/db/client.ts';
import { findChamberByTag } from './places.repository.ts';

/** The number of the chamber with a tag, as a list that is empty where the site has none. */
export async function listChamberIds(
  reader: Reader,
  site: SiteScope,
  tag: string,
): Promise<number[]> {
  const chamber = await findChamberByTag(reader, site.id, tag);
  return chamber === undefined ? [] : [chamber.id];
}
