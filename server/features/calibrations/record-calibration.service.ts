import type { z } from 'zod';
import type { SignedIn, SiteScope } from '#server/actor.ts';
import type { Tx } from '#server/db/client.ts';
import type { Deps } from '#server/deps.ts';
import { recordAudit } from '#server/features/audit/audit.service.ts';
import { loadSiteValidity } from '#server/features/availability/validity.service.ts';
import type { ScopeFacts, SiteValidity } from '#server/features/availability/validity.service.ts';
import { requireInstrument } from '#server/features/equipment/equipment.service.ts';
import { getFile } from '#server/features/files/files.service.ts';
import { ProblemError, problem } from '#server/problem.ts';
import type { InputFault } from '#server/problem.ts';
import type {
  CalibrationDto,
  recordCalibration as contract,
} from '#shared/contracts/calibrations.contract.ts';
import { siteDay } from '#shared/domain/calendar/site-day.ts';
import { describeRecord, requireRecord } from './calibrations.service.ts';
import { findRecord, insertRecord } from './calibrations.repository.ts';

type Wish = z.output<typeof contract.body>;
export type Changing = Pick<Deps, 'clock' | 'db' | 'requestId' | 'transact'>;

/** Keeps a record that awaits a second person; nothing changes before they have approved it. */
export async function recordCalibration(
  deps: Changing,
  actor: SignedIn,
  site: SiteScope,
  wish: Wish,
): Promise<CalibrationDto> {
  return deps.transact(async (tx) => {
    const { instrument } = await requireInstrument({ db: tx }, site, wish.tag);
    const now = deps.clock.now();
    const validity = await loadSiteValidity(tx, site, now.getTime(), [instrument.id]);
    requireDays(wish, siteDay(validity.calendar, now.getTime()));
    requireScopes(wish, validity, instrument.id);
    await requireFile(tx, actor, site, wish.fileId);
    await requireReplaceable(tx, site, wish, instrument.id);
    const isInHouse = /^in[- ]house$/i.test(wish.provider);
    const id = await insertRecord(
      tx,
      {
        instrumentId: instrument.id,
        state: 'awaiting-approval',
        performedOn: wish.performedOn,
        dueOn: wish.dueOn,
        inHouse: isInHouse,
        provider: isInHouse ? 'in-house' : wish.provider,
        certificateNumber: wish.certificateNumber,
        fileId: wish.fileId,
        conformityAsFound: wish.conformityAsFound,
        conformityAsLeft: wish.conformityAsLeft,
        note: wish.note,
        recordedById: actor.personId,
        replacesId: wish.replacesId ?? null,
        createdAt: now,
        updatedAt: now,
      },
      wish.scopes,
    );
    await recordAudit(deps, tx, {
      actor,
      site,
      action: 'calibration.record',
      subjectKind: 'calibration',
      subjectId: id,
      after: wish,
    });
    return describeRecord({ db: tx }, await requireRecord({ db: tx }, site, id));
  });
}

function requireDays(wish: Wish, today: string): void {
  const errors: InputFault[] = [];
  if (wish.performedOn > today) {
    errors.push({
      pointer: '#/performedOn',
      detail: 'This day is still to come. Give the day it was calibrated.',
    });
  }
  if (wish.dueOn <= wish.performedOn) {
    errors.push({
      pointer: '#/dueOn',
      detail: 'It falls due after the day it was calibrated. Give a later day.',
    });
  }
  if (errors.length > 0) {
    throw problem('input.invalid', {
      detail: errors.map(({ detail }) => detail).join(' '),
      errors,
    });
  }
}

/** Every line names something of this instrument that is calibrated, each once. */
function requireScopes(wish: Wish, validity: SiteValidity, instrumentId: number): void {
  const known = validity.scopesOf(instrumentId);
  const seen = new Set<string>();
  const errors = wish.scopes.flatMap((scope, place): InputFault[] => {
    const key = JSON.stringify([scope.channelId, scope.function, scope.meterRangeId]);
    const isRepeated = seen.has(key);
    seen.add(key);
    const pointer = `#/scopes/${place}`;
    if (isRepeated) {
      return [{ pointer, detail: 'This channel, function and range is named twice.' }];
    }
    return known.some((each) => covers(scope, each))
      ? []
      : [{ pointer, detail: `${wish.tag} has no such channel, function and range.` }];
  });
  if (errors.length > 0) {
    throw problem('calibration.scope', {
      detail: `${errors.length === 1 ? 'One line does' : `${errors.length} lines do`} not fit ${wish.tag}. Choose channels and ranges of this instrument.`,
      errors,
    });
  }
}

function covers(scope: Wish['scopes'][number], known: ScopeFacts): boolean {
  return (
    scope.function === known.function &&
    (scope.channelId === null || scope.channelId === known.channelId) &&
    (scope.meterRangeId === null || scope.meterRangeId === known.meterRangeId)
  );
}

async function requireFile(
  tx: Tx,
  actor: SignedIn,
  site: SiteScope,
  fileId: number | null,
): Promise<void> {
  if (fileId === null) {
    return;
  }
  try {
    await getFile({ db: tx }, actor, site, fileId);
  } catch (error) {
    if (error instanceof ProblemError && error.code === 'not-found') {
      const detail = 'The certificate file has not arrived. Send the file again, then the record.';
      throw problem('file.incomplete', {
        detail,
        errors: [{ detail, pointer: '#/fileId' }],
      });
    }
    throw error;
  }
}

async function requireReplaceable(
  tx: Tx,
  site: SiteScope,
  wish: Wish,
  instrumentId: number,
): Promise<void> {
  if (wish.replacesId === undefined) {
    return;
  }
  const old = await findRecord(tx, site.id, wish.replacesId);
  const isFit =
    old?.record.instrumentId === instrumentId &&
    old.record.state === 'approved' &&
    old.replacedById === null;
  if (!isFit) {
    throw problem('calibration.state', {
      detail: `Calibration ${wish.replacesId} is no approved record of ${wish.tag} that could be replaced. Open it to see where it stands.`,
    });
  }
}
