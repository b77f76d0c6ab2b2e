import type { DemoContext } from './demo-context.ts';
import { dayMs } from './demo-days.ts';
import type { RowOf } from './demo-rows.ts';
import type { People } from './people.ts';
import type { auditEventsTable } from '#server/db/tables/audit.table.ts';

type Event = Omit<RowOf<typeof auditEventsTable>, 'id'>;

/** Who did what, in the order it was done; unsealed, as every trail is at first. */
export function layAuditTrail(context: DemoContext, people: People): void {
  const events = [
    ...policyEvents(context),
    ...requestEvents(context),
    ...bookingEvents(context, people),
    ...calibrationEvents(context),
    ...equipmentEvents(context),
  ]
    .filter((event) => event.at.getTime() <= context.nowMs)
    .sort((a, b) => a.at.getTime() - b.at.getTime());
  for (const event of events) {
    context.rows.auditEvents.push({ id: context.number('auditEvents'), ...event });
  }
}

function siteOfInstrument(context: DemoContext): ReadonlyMap<number, number> {
  return new Map(context.rows.instruments.map((row) => [row.id ?? 0, row.siteId]));
}

function policyEvents({ rows }: DemoContext): Event[] {
  return rows.settings.map((row) => ({
    actorId: row.changedById ?? null,
    siteId: row.siteId ?? null,
    at: row.createdAt,
    action: 'policy.edit',
    subjectKind: 'policy',
    subjectId: row.id ?? null,
    after: { key: row.key, value: row.value },
  }));
}

function requestEvents({ rows }: DemoContext): Event[] {
  return rows.requests.flatMap((row) => {
    const of = {
      actorId: row.requesterId,
      siteId: row.siteId,
      subjectKind: 'request',
      subjectId: row.id ?? null,
    };
    const created = {
      ...of,
      at: row.createdAt,
      action: 'request.create',
      after: { state: 'draft' },
    };
    return row.submittedAt
      ? [
          created,
          {
            ...of,
            at: row.submittedAt,
            action: 'request.submit',
            before: { state: 'draft' },
            after: { state: 'submitted' },
          },
        ]
      : [created];
  });
}

function bookingEvents(context: DemoContext, people: People): Event[] {
  return context.rows.bookings.flatMap((row) => {
    const of = { siteId: row.siteId, subjectKind: 'booking', subjectId: row.id ?? null };
    const confirmed = {
      ...of,
      actorId: row.confirmedById ?? null,
      at: row.confirmedAt ?? row.createdAt,
      action: 'booking.confirm',
      after: {
        state: 'confirmed',
        requestId: row.requestId,
        lotId: row.lotId,
        startAt: new Date(row.during.startMs).toISOString(),
        endAt: new Date(row.during.endMs).toISOString(),
      },
    };
    const cancelled = {
      ...of,
      actorId: people.scheduler,
      at: new Date(row.during.startMs),
      action: 'booking.cancel',
      before: { state: 'confirmed' },
      after: { state: 'cancelled', reason: row.cancelReason },
    };
    return row.state === 'cancelled' ? [confirmed, cancelled] : [confirmed];
  });
}

function calibrationEvents(context: DemoContext): Event[] {
  const siteOf = siteOfInstrument(context);
  const sinceMs = context.nowMs - 400 * dayMs;
  return context.rows.calibrations
    .filter((row) => row.createdAt.getTime() > sinceMs)
    .flatMap((row) => {
      const of = {
        siteId: siteOf.get(row.instrumentId) ?? null,
        subjectKind: 'calibration',
        subjectId: row.id ?? null,
      };
      const recorded = {
        ...of,
        actorId: row.recordedById,
        at: row.createdAt,
        action: 'calibration.record',
        after: { certificateNumber: row.certificateNumber, dueOn: row.dueOn },
      };
      if (!row.decidedAt) {
        return [recorded];
      }
      const isRefused = row.state === 'refused';
      return [
        recorded,
        {
          ...of,
          actorId: row.decidedById ?? null,
          at: row.decidedAt,
          action: isRefused ? 'calibration.refuse' : 'calibration.approve',
          before: { state: 'awaiting-approval' },
          after: isRefused
            ? { state: 'refused', reason: row.refusalReason }
            : { state: 'approved' },
        },
      ];
    });
}

function equipmentEvents(context: DemoContext): Event[] {
  const { rows } = context;
  const siteOf = siteOfInstrument(context);
  const broken = rows.unavailabilities.map((row) => ({
    actorId: row.reportedById,
    siteId: siteOf.get(row.instrumentId ?? 0) ?? null,
    at: row.startsAt,
    action: row.reason === 'breakdown' ? 'breakdown.report' : 'equipment.take-out-of-service',
    subjectKind: 'instrument',
    subjectId: row.instrumentId ?? null,
    after: { reason: row.reason, note: row.note },
  }));
  const planned = rows.outages.map((row) => ({
    actorId: row.plannedById,
    siteId: row.siteId,
    at: row.createdAt,
    action: 'outage.plan',
    subjectKind: 'outage',
    subjectId: row.id ?? null,
    after: { title: row.title },
  }));
  const judged = rows.assessments.map((row) => ({
    actorId: row.assessedById,
    siteId: siteOf.get(row.chamberId) ?? null,
    at: row.createdAt,
    action: 'stability.assess',
    subjectKind: 'instrument',
    subjectId: row.chamberId,
    after: { setTemperatureC: row.setTempMdegc / 1000, driftKPerH: row.driftKPerH },
  }));
  return [...broken, ...planned, ...judged];
}
