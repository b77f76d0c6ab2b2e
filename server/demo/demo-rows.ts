import type { InferInsertModel } from 'drizzle-orm';
import type { PgTable } from 'drizzle-orm/pg-core';
import type { allocationsTable } from '#server/db/tables/allocation.table.ts';
import type { auditEventsTable } from '#server/db/tables/audit.table.ts';
import type { bookingCellsTable, bookingsTable } from '#server/db/tables/booking.table.ts';
import type {
  calibrationScopesTable,
  calibrationsTable,
  dutiesTable,
  providersTable,
} from '#server/db/tables/calibration.table.ts';
import type { cellTypesTable, cellsTable } from '#server/db/tables/cell.table.ts';
import type { chamberPositionsTable, chamberSpecsTable } from '#server/db/tables/chamber.table.ts';
import type {
  channelPairsTable,
  channelsTable,
  meterRangesTable,
  sourceSpecsTable,
} from '#server/db/tables/channel.table.ts';
import type { deviationsTable } from '#server/db/tables/check-result.table.ts';
import type { instrumentsTable } from '#server/db/tables/instrument.table.ts';
import type { chamberLoadsTable, loadPhasesTable } from '#server/db/tables/load.table.ts';
import type { otherWorkTable } from '#server/db/tables/other-work.table.ts';
import type {
  outageInstrumentsTable,
  outagesTable,
  unavailabilitiesTable,
} from '#server/db/tables/outage.table.ts';
import type { panelMembersTable, panelsTable } from '#server/db/tables/panel.table.ts';
import type { grantsTable, personsTable } from '#server/db/tables/person.table.ts';
import type { projectMembersTable, projectsTable } from '#server/db/tables/project.table.ts';
import type {
  requestLotCellsTable,
  requestLotsTable,
  requestsTable,
} from '#server/db/tables/request.table.ts';
import type { runEventsTable, runsTable } from '#server/db/tables/run.table.ts';
import type { settingsTable } from '#server/db/tables/setting.table.ts';
import type {
  roomsTable,
  siteCalendarExceptionsTable,
  sitesTable,
} from '#server/db/tables/site.table.ts';
import type { stabilityAssessmentsTable } from '#server/db/tables/stability-assessment.table.ts';
import type {
  limitationsTable,
  unattendedPermissionsTable,
  unitsTable,
} from '#server/db/tables/unit.table.ts';

/** A row with its record number already chosen, so that rows can name each other before they are written. */
export type RowOf<Table extends PgTable> = InferInsertModel<
  Table,
  { dbColumnNames: false; override: true }
>;

/** Everything the demo writes, table by table. */
export type DemoRows = {
  readonly sites: RowOf<typeof sitesTable>[];
  readonly siteExceptions: RowOf<typeof siteCalendarExceptionsTable>[];
  readonly rooms: RowOf<typeof roomsTable>[];
  readonly persons: RowOf<typeof personsTable>[];
  readonly grants: RowOf<typeof grantsTable>[];
  readonly settings: RowOf<typeof settingsTable>[];
  readonly projects: RowOf<typeof projectsTable>[];
  readonly projectMembers: RowOf<typeof projectMembersTable>[];
  readonly instruments: RowOf<typeof instrumentsTable>[];
  readonly channels: RowOf<typeof channelsTable>[];
  readonly channelPairs: RowOf<typeof channelPairsTable>[];
  readonly meterRanges: RowOf<typeof meterRangesTable>[];
  readonly sourceSpecs: RowOf<typeof sourceSpecsTable>[];
  readonly chamberSpecs: RowOf<typeof chamberSpecsTable>[];
  readonly positions: RowOf<typeof chamberPositionsTable>[];
  readonly units: RowOf<typeof unitsTable>[];
  readonly panels: RowOf<typeof panelsTable>[];
  readonly panelMembers: RowOf<typeof panelMembersTable>[];
  readonly cellTypes: RowOf<typeof cellTypesTable>[];
  readonly cells: RowOf<typeof cellsTable>[];
  readonly unattendedPermissions: RowOf<typeof unattendedPermissionsTable>[];
  readonly limitations: RowOf<typeof limitationsTable>[];
  readonly providers: RowOf<typeof providersTable>[];
  readonly duties: RowOf<typeof dutiesTable>[];
  readonly calibrations: RowOf<typeof calibrationsTable>[];
  readonly calibrationScopes: RowOf<typeof calibrationScopesTable>[];
  readonly assessments: RowOf<typeof stabilityAssessmentsTable>[];
  readonly outages: RowOf<typeof outagesTable>[];
  readonly outageInstruments: RowOf<typeof outageInstrumentsTable>[];
  readonly unavailabilities: RowOf<typeof unavailabilitiesTable>[];
  readonly requests: RowOf<typeof requestsTable>[];
  readonly lots: RowOf<typeof requestLotsTable>[];
  readonly lotCells: RowOf<typeof requestLotCellsTable>[];
  readonly loads: RowOf<typeof chamberLoadsTable>[];
  readonly loadPhases: RowOf<typeof loadPhasesTable>[];
  readonly otherWork: RowOf<typeof otherWorkTable>[];
  readonly bookings: RowOf<typeof bookingsTable>[];
  readonly bookingCells: RowOf<typeof bookingCellsTable>[];
  readonly allocations: RowOf<typeof allocationsTable>[];
  readonly deviations: RowOf<typeof deviationsTable>[];
  readonly runs: RowOf<typeof runsTable>[];
  readonly runEvents: RowOf<typeof runEventsTable>[];
  readonly auditEvents: RowOf<typeof auditEventsTable>[];
};

export function emptyRows(): DemoRows {
  return {
    sites: [],
    siteExceptions: [],
    rooms: [],
    persons: [],
    grants: [],
    settings: [],
    projects: [],
    projectMembers: [],
    instruments: [],
    channels: [],
    channelPairs: [],
    meterRanges: [],
    sourceSpecs: [],
    chamberSpecs: [],
    positions: [],
    units: [],
    panels: [],
    panelMembers: [],
    cellTypes: [],
    cells: [],
    unattendedPermissions: [],
    limitations: [],
    providers: [],
    duties: [],
    calibrations: [],
    calibrationScopes: [],
    assessments: [],
    outages: [],
    outageInstruments: [],
    unavailabilities: [],
    requests: [],
    lots: [],
    lotCells: [],
    loads: [],
    loadPhases: [],
    otherWork: [],
    bookings: [],
    bookingCells: [],
    allocations: [],
    deviations: [],
    runs: [],
    runEvents: [],
    auditEvents: [],
  };
}
