import type { z } from 'zod';
import type { SignedIn, SiteScope } from '#server/actor.ts';
import { lockInstruments } from '#server/db/lock-places.ts';
import { recordAudit } from '#server/features/audit/audit.service.ts';
import { reassessBookings } from '#server/features/bookings/reassess-bookings.service.ts';
import { getWorkingCalendar } from '#server/features/settings/settings.service.ts';
import { problem } from '#server/problem.ts';
import type {
  createAssessment as contract,
  InstrumentDto,
} from '#shared/contracts/equipment.contract.ts';
import { buildCalendarIndex } from '#shared/domain/calendar/build-calendar-index.ts';
import { siteDay } from '#shared/domain/calendar/site-day.ts';
import { describeInstrument, requireInstrument } from './equipment.service.ts';
import { findByTag, insertAssessment } from './equipment.repository.ts';
import type { Changing } from './service-state.service.ts';

type Wish = z.output<typeof contract.body>;

/**
 * Keeps what a judged chamber log showed. The door rule of the chamber is not changed by it: a strict
 * door becomes tolerant on the chamber's record, because loads already planned rest on it.
 */
export async function createAssessment(
  deps: Changing,
  actor: SignedIn,
  site: SiteScope,
  wish: Wish & { readonly tag: string },
): Promise<InstrumentDto> {
  return deps.transact(async (tx) => {
    const row = await requireInstrument({ db: tx }, site, wish.tag);
    if (row.instrument.kind !== 'chamber') {
      throw problem('instrument.state', {
        detail: `${wish.tag} is no chamber. Open the chamber the log is about and enter it there.`,
      });
    }
    const now = deps.clock.now();
    const calendar = buildCalendarIndex(await getWorkingCalendar({ db: tx }, site.id));
    if (wish.assessedOn > siteDay(calendar, now.getTime())) {
      throw invalid('#/assessedOn', 'This day is still to come. Give the day the log was judged.');
    }
    const loggerId = await findLogger(tx, site, wish.loggerTag);
    const places = await lockInstruments(tx, [row.instrument.id]);
    const assessmentId = await insertAssessment(tx, {
      chamberId: row.instrument.id,
      setTempMdegc: Math.round(wish.setTemperatureC * 1000),
      assessedOn: wish.assessedOn,
      hoursLogged: wish.hoursLogged,
      driftKPerH: wish.driftKPerH,
      halfBandK: wish.halfBandK,
      periodS: wish.periodS,
      resolutionK: wish.resolutionK,
      sensorPlace: wish.sensorPlace,
      loggerId,
      doorTolerant: wish.isDoorTolerant,
      assessedById: actor.personId,
      note: wish.note,
      createdAt: now,
      updatedAt: now,
    });
    await recordAudit(deps, tx, {
      actor,
      site,
      action: 'stability.assess',
      subjectKind: 'stability-assessment',
      subjectId: assessmentId,
      after: wish,
    });
    await reassessBookings(deps, tx, site, places, actor);
    return describeInstrument({ clock: deps.clock, db: tx }, actor, site, row);
  });
}

async function findLogger(
  tx: Parameters<typeof findByTag>[0],
  site: SiteScope,
  tag: string | null,
): Promise<number | null> {
  if (tag === null) {
    return null;
  }
  const row = await findByTag(tx, site.id, tag);
  if (row?.instrument.kind !== 'logger') {
    throw invalid('#/loggerTag', `There is no logger ${tag} at this site. Check the tag.`);
  }
  return row.instrument.id;
}

function invalid(pointer: string, detail: string) {
  return problem('input.invalid', { detail, errors: [{ detail, pointer }] });
}
