import { sql } from 'drizzle-orm';
import {
  boolean,
  check,
  doublePrecision,
  foreignKey,
  index,
  integer,
  pgTable,
  text,
  unique,
} from 'drizzle-orm/pg-core';
import { channelFunctions } from '#shared/domain/states.ts';
import { id, oneOf, timestamps, version } from '#server/db/columns.ts';
import { instrumentsTable } from './instrument.table.ts';

export const channelsTable = pgTable(
  'channel',
  {
    id: id(),
    instrumentId: integer('instrument_id')
      .notNull()
      .references(() => instrumentsTable.id),
    /** With the instrument's tag, as people say it: S05/1. */
    label: text('label').notNull().unique('channel_label'),
    function: text('function', { enum: channelFunctions }).notNull(),
    version: version(),
    ...timestamps(),
  },
  (t) => [
    oneOf('channel_function', t.function, channelFunctions),
    unique('channel_of_instrument').on(t.id, t.instrumentId),
    index('channel_instrument').on(t.instrumentId),
  ],
);

/** A source and a meter channel of one instrument that are taken both or neither. */
export const channelPairsTable = pgTable(
  'channel_pair',
  {
    id: id(),
    instrumentId: integer('instrument_id').notNull(),
    sourceChannelId: integer('source_channel_id').notNull().unique('channel_pair_source'),
    meterChannelId: integer('meter_channel_id').notNull().unique('channel_pair_meter'),
  },
  (t) => [
    check('channel_pair_of_two', sql`${t.sourceChannelId} <> ${t.meterChannelId}`),
    foreignKey({
      name: 'channel_pair_source_of_instrument',
      columns: [t.sourceChannelId, t.instrumentId],
      foreignColumns: [channelsTable.id, channelsTable.instrumentId],
    }),
    foreignKey({
      name: 'channel_pair_meter_of_instrument',
      columns: [t.meterChannelId, t.instrumentId],
      foreignColumns: [channelsTable.id, channelsTable.instrumentId],
    }),
  ],
);

/** A current range of a meter; without a channel it holds for all of the instrument's. */
export const meterRangesTable = pgTable(
  'meter_range',
  {
    id: id(),
    instrumentId: integer('instrument_id')
      .notNull()
      .references(() => instrumentsTable.id),
    channelId: integer('channel_id'),
    label: text('label').notNull(),
    fullScaleA: doublePrecision('full_scale_a').notNull(),
    resolutionA: doublePrecision('resolution_a').notNull(),
    noiseA: doublePrecision('noise_a').notNull(),
    accuracyPpmReading: doublePrecision('accuracy_ppm_reading').notNull(),
    accuracyPpmRange: doublePrecision('accuracy_ppm_range').notNull(),
    accuracyA: doublePrecision('accuracy_a').notNull(),
    /** Unknown stops a booking: a burden outside the sense loop can make a hold take days. */
    burdenOhm: doublePrecision('burden_ohm'),
    burdenInsideLoop: boolean('burden_inside_loop'),
    sampleIntervalS: doublePrecision('sample_interval_s').notNull(),
    version: version(),
    ...timestamps(),
  },
  (t) => [
    foreignKey({
      name: 'meter_range_channel_of_instrument',
      columns: [t.channelId, t.instrumentId],
      foreignColumns: [channelsTable.id, channelsTable.instrumentId],
    }),
    unique('meter_range_label').on(t.instrumentId, t.channelId, t.label).nullsNotDistinct(),
    check(
      'meter_range_figures',
      sql`${t.fullScaleA} > 0 and ${t.resolutionA} > 0 and ${t.noiseA} >= 0 and ${t.accuracyPpmReading} >= 0 and ${t.accuracyPpmRange} >= 0 and ${t.accuracyA} >= 0 and ${t.burdenOhm} >= 0 and ${t.sampleIntervalS} > 0`,
    ),
  ],
);

/** What a source can do; without a channel it holds for all of the instrument's. */
export const sourceSpecsTable = pgTable(
  'source_spec',
  {
    id: id(),
    instrumentId: integer('instrument_id')
      .notNull()
      .references(() => instrumentsTable.id),
    channelId: integer('channel_id'),
    minV: doublePrecision('min_v').notNull(),
    maxV: doublePrecision('max_v').notNull(),
    /** Missing where never stated. */
    stabilityVPerH: doublePrecision('stability_v_per_h'),
    noiseV: doublePrecision('noise_v').notNull(),
    outputOhm: doublePrecision('output_ohm').notNull(),
    tempcoVPerK: doublePrecision('tempco_v_per_k'),
    version: version(),
    ...timestamps(),
  },
  (t) => [
    foreignKey({
      name: 'source_spec_channel_of_instrument',
      columns: [t.channelId, t.instrumentId],
      foreignColumns: [channelsTable.id, channelsTable.instrumentId],
    }),
    unique('source_spec_once').on(t.instrumentId, t.channelId).nullsNotDistinct(),
    check(
      'source_spec_figures',
      sql`${t.minV} < ${t.maxV} and ${t.stabilityVPerH} >= 0 and ${t.noiseV} >= 0 and ${t.outputOhm} >= 0 and ${t.tempcoVPerK} >= 0`,
    ),
  ],
);
