import { and, asc, eq, inArray } from 'drizzle-orm';
import type { Reader } from '#server/db/client.ts';
import { channelsTable, meterRangesTable } from '#server/db/tables/channel.table.ts';
import { instrumentsTable } from '#server/db/tables/instrument.table.ts';
import { unitsTable } from '#server/db/tables/unit.table.ts';

/** Every channel of a site's instruments, whether a panel reaches it or not. */
export async function listSiteChannels(
  reader: Reader,
  siteId: number,
  instrumentIds?: readonly number[],
) {
  return reader
    .select({
      unitId: unitsTable.id,
      channelId: channelsTable.id,
      label: channelsTable.label,
      function: channelsTable.function,
      instrumentId: channelsTable.instrumentId,
    })
    .from(channelsTable)
    .innerJoin(unitsTable, eq(unitsTable.channelId, channelsTable.id))
    .innerJoin(instrumentsTable, eq(instrumentsTable.id, channelsTable.instrumentId))
    .where(
      and(
        eq(instrumentsTable.siteId, siteId),
        instrumentIds === undefined
          ? undefined
          : inArray(channelsTable.instrumentId, [...instrumentIds]),
      ),
    )
    .orderBy(asc(channelsTable.id));
}
export type SiteChannelRow = Awaited<ReturnType<typeof listSiteChannels>>[number];

export async function listRangeLabels(reader: Reader, instrumentIds: readonly number[]) {
  const t = meterRangesTable;
  return reader
    .select({
      id: t.id,
      instrumentId: t.instrumentId,
      channelId: t.channelId,
      label: t.label,
    })
    .from(t)
    .where(inArray(t.instrumentId, [...instrumentIds]))
    .orderBy(asc(t.fullScaleA), asc(t.id));
}
export type RangeLabelRow = Awaited<ReturnType<typeof listRangeLabels>>[number];
