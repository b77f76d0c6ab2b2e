import { formatSiteTime } from '#shared/domain/calendar/format-site-time.ts';
import { judgeRest } from './judge-rest.ts';
import { makeResult } from './make-result.ts';
import type { CheckResult, PlacementFacts } from './types.ts';

const hourMs = 3_600_000;
const dayMs = 24 * hourMs;

/**
 * Did the cells rest long enough between their last charge or discharge and the start of the slot?
 *
 * @example checkRestTime(facts).outcome // 'stop' 20 hours after a discharge, for a settled value
 */
export function checkRestTime(facts: PlacementFacts): CheckResult {
  const { restedSinceMs, kind } = facts.request;
  const code = 'rest-time';
  const restMs = restedSinceMs === null ? null : facts.span.startMs - restedSinceMs;
  const outcome = judgeRest(kind, restMs);
  if (restMs === null || restedSinceMs === null) {
    return makeResult(
      code,
      outcome,
      'Nobody stated when the cells were last charged or discharged.',
      {
        waysOut: [
          {
            kind: 'change-request',
            sentence: 'State the last charge or discharge.',
            subject: null,
          },
        ],
      },
    );
  }
  const rested =
    restMs < 2 * dayMs ? `${Math.floor(restMs / hourMs)} h` : `${Math.floor(restMs / dayMs)} days`;
  const evidence = [
    {
      label: 'Last charge or discharge',
      value: formatSiteTime(facts.index.calendar, restedSinceMs),
      source: 'cells',
    },
  ];
  if (outcome === 'pass') {
    return makeResult(code, outcome, `The cells rest ${rested} before the slot.`, { evidence });
  }
  if (outcome === 'stop') {
    const from = formatSiteTime(facts.index.calendar, restedSinceMs + dayMs);
    return makeResult(
      code,
      outcome,
      `The cells rest only ${rested} before the slot; a settled value needs 24 h.`,
      {
        evidence,
        waysOut: [{ kind: 'later-start', sentence: `Start at ${from} or later.`, subject: null }],
      },
    );
  }
  const sentence =
    restMs < 7 * dayMs
      ? `The cells rest ${rested}, less than 7 days; compare within one batch only.`
      : `The cells rest ${rested}, less than 30 days; this is no absolute value.`;
  return makeResult(code, outcome, sentence, { evidence });
}
