import { sql } from 'drizzle-orm';
import {
  type AnyPgColumn,
  boolean,
  check,
  date,
  foreignKey,
  index,
  integer,
  pgTable,
  text,
  unique,
} from 'drizzle-orm/pg-core';
import {
  calibratedFunctions,
  calibrationStates,
  conformities,
  dutyKinds,
} from '#shared/domain/states.ts';
import { id, instant, oneOf, timestamps, version } from '#server/db/columns.ts';
import { channelsTable, meterRangesTable } from './channel.table.ts';
import { filesTable } from './file.table.ts';
import { instrumentsTable } from './instrument.table.ts';
import { personsTable } from './person.table.ts';

/** Who calibrates for us, within which scope and until when. */
export const providersTable = pgTable('provider', {
  id: id(),
  name: text('name').notNull().unique('provider_name'),
  scope: text('scope').notNull(),
  accreditationNo: text('accreditation_no'),
  expiresOn: date('expires_on', { mode: 'string' }),
  version: version(),
  ...timestamps(),
});

/** Something that falls due on an instrument again and again. */
export const dutiesTable = pgTable(
  'duty',
  {
    id: id(),
    instrumentId: integer('instrument_id')
      .notNull()
      .references(() => instrumentsTable.id),
    kind: text('kind', { enum: dutyKinds }).notNull(),
    intervalMonths: integer('interval_months').notNull(),
    channelId: integer('channel_id'),
    function: text('function', { enum: calibratedFunctions }),
    meterRangeId: integer('meter_range_id').references(() => meterRangesTable.id),
    /** A calendar day at the instrument's site; unknown until first done. */
    nextDueOn: date('next_due_on', { mode: 'string' }),
    custodianId: integer('custodian_id').references(() => personsTable.id),
    endedAt: instant('ended_at'),
    version: version(),
    ...timestamps(),
  },
  (t) => [
    oneOf('duty_kind', t.kind, dutyKinds),
    oneOf('duty_function', t.function, calibratedFunctions),
    check('duty_interval', sql`${t.intervalMonths} between 1 and 120`),
    foreignKey({
      name: 'duty_channel_of_instrument',
      columns: [t.channelId, t.instrumentId],
      foreignColumns: [channelsTable.id, channelsTable.instrumentId],
    }),
    unique('duty_once')
      .on(t.instrumentId, t.kind, t.channelId, t.function, t.meterRangeId)
      .nullsNotDistinct(),
    index('duty_due').on(t.nextDueOn),
    index('duty_custodian').on(t.custodianId),
  ],
);

/** Never edited once approved; a correction is a new record that names the one it replaces. */
export const calibrationsTable = pgTable(
  'calibration',
  {
    id: id(),
    instrumentId: integer('instrument_id')
      .notNull()
      .references(() => instrumentsTable.id),
    state: text('state', { enum: calibrationStates }).notNull(),
    performedOn: date('performed_on', { mode: 'string' }).notNull(),
    dueOn: date('due_on', { mode: 'string' }).notNull(),
    inHouse: boolean('in_house').notNull(),
    /** As the certificate names it. */
    provider: text('provider').notNull(),
    providerId: integer('provider_id').references(() => providersTable.id),
    certificateNumber: text('certificate_number').notNull(),
    fileId: integer('file_id').references(() => filesTable.id),
    conformityAsFound: text('conformity_as_found', { enum: conformities }).notNull(),
    conformityAsLeft: text('conformity_as_left', { enum: conformities }).notNull(),
    note: text('note'),
    recordedById: integer('recorded_by_id')
      .notNull()
      .references(() => personsTable.id),
    /** Who approved or refused it. */
    decidedById: integer('decided_by_id').references(() => personsTable.id),
    decidedAt: instant('decided_at'),
    refusalReason: text('refusal_reason'),
    replacesId: integer('replaces_id').references((): AnyPgColumn => calibrationsTable.id),
    version: version(),
    ...timestamps(),
  },
  (t) => [
    oneOf('calibration_state', t.state, calibrationStates),
    oneOf('calibration_as_found', t.conformityAsFound, conformities),
    oneOf('calibration_as_left', t.conformityAsLeft, conformities),
    check('calibration_dates', sql`${t.dueOn} > ${t.performedOn}`),
    check('calibration_in_house', sql`not ${t.inHouse} or ${t.providerId} is null`),
    check('calibration_second_person', sql`${t.decidedById} <> ${t.recordedById}`),
    check(
      'calibration_decided',
      sql`${t.state} in ('draft', 'awaiting-approval') or (${t.decidedById} is not null and ${t.decidedAt} is not null)`,
    ),
    check(
      'calibration_refusal_has_reason',
      sql`${t.state} <> 'refused' or ${t.refusalReason} is not null`,
    ),
    check('calibration_replaces_another', sql`${t.replacesId} <> ${t.id}`),
    index('calibration_instrument').on(t.instrumentId, t.state, t.performedOn),
    index('calibration_state_id').on(t.state, t.id),
    index('calibration_provider').on(t.providerId),
    index('calibration_replaces').on(t.replacesId),
    index('calibration_file').on(t.fileId),
  ],
);

/** What a calibration vouches for; no channel or range means all of the instrument's. */
export const calibrationScopesTable = pgTable(
  'calibration_scope',
  {
    id: id(),
    calibrationId: integer('calibration_id')
      .notNull()
      .references(() => calibrationsTable.id, { onDelete: 'cascade' }),
    channelId: integer('channel_id').references(() => channelsTable.id),
    function: text('function', { enum: calibratedFunctions }).notNull(),
    meterRangeId: integer('meter_range_id').references(() => meterRangesTable.id),
    /** Set where the calibration holds only in part. */
    limitation: text('limitation'),
  },
  (t) => [
    oneOf('calibration_scope_function', t.function, calibratedFunctions),
    unique('calibration_scope_once')
      .on(t.calibrationId, t.channelId, t.function, t.meterRangeId)
      .nullsNotDistinct(),
    index('calibration_scope_channel').on(t.channelId),
    index('calibration_scope_meter_range').on(t.meterRangeId),
  ],
);
