import type { PgInsertValue, PgTable } from 'drizzle-orm/pg-core';
import type { Tx } from '#server/db/client.ts';
import { allocationsTable } from '#server/db/tables/allocation.table.ts';
import { auditEventsTable } from '#server/db/tables/audit.table.ts';
import { bookingCellsTable, bookingsTable } from '#server/db/tables/booking.table.ts';
import {
  calibrationScopesTable,
  calibrationsTable,
  dutiesTable,
  providersTable,
} from '#server/db/tables/calibration.table.ts';
import { cellTypesTable, cellsTable } from '#server/db/tables/cell.table.ts';
import { chamberPositionsTable, chamberSpecsTable } from '#server/db/tables/chamber.table.ts';
import {
  channelPairsTable,
  channelsTable,
  meterRangesTable,
  sourceSpecsTable,
} from '#server/db/tables/channel.table.ts';
import { deviationsTable } from '#server/db/tables/check-result.table.ts';
import { instrumentsTable } from '#server/db/tables/instrument.table.ts';
import { chamberLoadsTable, loadPhasesTable } from '#server/db/tables/load.table.ts';
import { otherWorkTable } from '#server/db/tables/other-work.table.ts';
import {
  outageInstrumentsTable,
  outagesTable,
  unavailabilitiesTable,
} from '#server/db/tables/outage.table.ts';
import { panelMembersTable, panelsTable } from '#server/db/tables/panel.table.ts';
import { grantsTable, personsTable } from '#server/db/tables/person.table.ts';
import { projectMembersTable, projectsTable } from '#server/db/tables/project.table.ts';
import {
  requestLotCellsTable,
  requestLotsTable,
  requestsTable,
} from '#server/db/tables/request.table.ts';
import { runEventsTable, runsTable } from '#server/db/tables/run.table.ts';
import { settingsTable } from '#server/db/tables/setting.table.ts';
import {
  roomsTable,
  siteCalendarExceptionsTable,
  sitesTable,
} from '#server/db/tables/site.table.ts';
import { stabilityAssessmentsTable } from '#server/db/tables/stability-assessment.table.ts';
import {
  limitationsTable,
  unattendedPermissionsTable,
  unitsTable,
} from '#server/db/tables/unit.table.ts';
import type { DemoRows } from './demo-rows.ts';
import { insertNumberedRows } from './insert-rows.ts';

/** Writes all rows, parents first. */
export async function writeDemo(tx: Tx, rows: DemoRows): Promise<void> {
  const insert = <Table extends PgTable>(
    table: Table,
    values: readonly PgInsertValue<Table, true>[],
  ): Promise<void> => insertNumberedRows(tx, table, values);

  await insert(sitesTable, rows.sites);
  await insert(siteCalendarExceptionsTable, rows.siteExceptions);
  await insert(roomsTable, rows.rooms);
  await insert(personsTable, rows.persons);
  await insert(grantsTable, rows.grants);
  await insert(settingsTable, rows.settings);
  await insert(projectsTable, rows.projects);
  await insert(projectMembersTable, rows.projectMembers);
  await insert(instrumentsTable, rows.instruments);
  await insert(channelsTable, rows.channels);
  await insert(channelPairsTable, rows.channelPairs);
  await insert(meterRangesTable, rows.meterRanges);
  await insert(sourceSpecsTable, rows.sourceSpecs);
  await insert(chamberSpecsTable, rows.chamberSpecs);
  await insert(chamberPositionsTable, rows.positions);
  await insert(unitsTable, rows.units);
  await insert(panelsTable, rows.panels);
  await insert(panelMembersTable, rows.panelMembers);
  await insert(cellTypesTable, rows.cellTypes);
  await insert(cellsTable, rows.cells);
  await insert(unattendedPermissionsTable, rows.unattendedPermissions);
  await insert(limitationsTable, rows.limitations);
  await insert(providersTable, rows.providers);
  await insert(dutiesTable, rows.duties);
  await insert(calibrationsTable, rows.calibrations);
  await insert(calibrationScopesTable, rows.calibrationScopes);
  await insert(stabilityAssessmentsTable, rows.assessments);
  await insert(outagesTable, rows.outages);
  await insert(outageInstrumentsTable, rows.outageInstruments);
  await insert(unavailabilitiesTable, rows.unavailabilities);
  await insert(requestsTable, rows.requests);
  await insert(requestLotsTable, rows.lots);
  await insert(requestLotCellsTable, rows.lotCells);
  await insert(chamberLoadsTable, rows.loads);
  await insert(loadPhasesTable, rows.loadPhases);
  await insert(otherWorkTable, rows.otherWork);
  await insert(bookingsTable, rows.bookings);
  await insert(bookingCellsTable, rows.bookingCells);
  await insert(allocationsTable, rows.allocations);
  await insert(deviationsTable, rows.deviations);
  await insert(runsTable, rows.runs);
  await insert(runEventsTable, rows.runEvents);
  await insert(auditEventsTable, rows.auditEvents);
}
