import { formatSiteDay } from '#shared/domain/calendar/format-site-day.ts';
import { formatSiteTime } from '#shared/domain/calendar/format-site-time.ts';
import { validUntil } from '#shared/domain/calibration-validity/valid-until.ts';
import type { ValiditySpan } from '#shared/domain/facility/types.ts';
import { overlaps } from '#shared/domain/intervals/overlaps.ts';
import { covers } from './covers.ts';
import { makeResult } from './make-result.ts';
import type { CheckResult, Evidence, PlacementFacts } from './types.ts';

type Calibrated = {
  readonly tag: string;
  readonly what: string;
  readonly validity: readonly ValiditySpan[];
};

/**
 * Is the calibration of every channel, function and range booked, and of the chamber's temperature,
 * valid from the start of connect to the end of unload? A limitation in force is a caution.
 *
 * @example checkCalibrationValid(facts).sentence // 'M12/3 10 µA is due 17 Jun 2026; the slot ends Fri 19 Jun 08:30.'
 */
export function checkCalibrationValid(facts: PlacementFacts): CheckResult {
  const code = 'calibration-valid';
  const things = listCalibrated(facts);
  const failed = things.find((thing) => !covers(thing.validity, facts.span));
  if (failed !== undefined) {
    return makeResult(code, 'stop', describeFailure(failed, facts), {
      evidence: [describeValidity(failed, facts)],
      waysOut: [
        {
          kind: 'record-calibration',
          sentence: `Record a calibration of ${failed.tag}.`,
          subject: failed.tag,
        },
        { kind: 'other-path', sentence: 'Choose another path.', subject: failed.tag },
      ],
    });
  }
  const evidence = things.map((thing) => describeValidity(thing, facts));
  for (const thing of things) {
    const limited = thing.validity.find(
      (span) => span.limitation !== null && overlaps(span, facts.span),
    );
    if (limited !== undefined) {
      const sentence = `${thing.tag} ${thing.what} is calibrated with a limitation: ${limited.limitation ?? ''}.`;
      return makeResult(code, 'caution', sentence, { evidence });
    }
  }
  return makeResult(code, 'pass', 'Every calibration is valid to the end of the slot.', {
    evidence,
  });
}

function listCalibrated(facts: PlacementFacts): readonly Calibrated[] {
  const chamber = { tag: facts.chamber.tag, what: 'temperature', validity: facts.chamber.validity };
  const channels = facts.paths.flatMap(({ source, meter, range }) => [
    { tag: source.tag, what: 'voltage', validity: source.validity },
    { tag: meter.tag, what: range.label, validity: range.validity },
  ]);
  return [chamber, ...channels];
}

function describeFailure(thing: Calibrated, facts: PlacementFacts): string {
  const name = `${thing.tag} ${thing.what}`;
  const untilMs = validUntil(thing.validity, facts.span.startMs);
  if (untilMs === null) {
    return describeLapse(name, thing, facts);
  }
  const dueOn = thing.validity.find((span) => span.endMs === untilMs)?.dueOn ?? null;
  const end = formatSiteTime(facts.index.calendar, facts.span.endMs);
  return dueOn === null
    ? `The calibration of ${name} ends ${formatSiteTime(facts.index.calendar, untilMs)}; the slot ends ${end}.`
    : `${name} is due ${formatSiteDay(dueOn)}; the slot ends ${end}.`;
}

function describeLapse(name: string, thing: Calibrated, facts: PlacementFacts): string {
  const lapsed = thing.validity.findLast((span) => span.endMs <= facts.span.startMs);
  const dueOn = lapsed?.dueOn ?? null;
  return dueOn === null
    ? `${name} is not validly calibrated at the start of the slot.`
    : `${name} is due ${formatSiteDay(dueOn)}, before the slot starts ${formatSiteTime(facts.index.calendar, facts.span.startMs)}.`;
}

function describeValidity(thing: Calibrated, facts: PlacementFacts): Evidence {
  const untilMs = validUntil(thing.validity, facts.span.startMs);
  const last = thing.validity.findLast((span) =>
    untilMs === null ? span.startMs <= facts.span.startMs : span.endMs === untilMs,
  );
  const dueOn = last?.dueOn ?? null;
  return {
    label: `${thing.tag} ${thing.what}`,
    value:
      dueOn !== null
        ? `due ${formatSiteDay(dueOn)}`
        : untilMs === null
          ? 'not valid'
          : `valid until ${formatSiteTime(facts.index.calendar, untilMs)}`,
    source: last === undefined ? thing.tag : `calibration ${last.calibrationId}`,
  };
}
