import type { z } from 'zod';
import { createAssessment } from '#shared/contracts/equipment.contract.ts';
import { parseFigure } from '#src/lib/format-number.ts';
import { t } from '#src/texts/t.ts';

/** As typed: figures stay text until the form is sent. */
export type AssessmentDraft = {
  readonly setTemperatureC: string;
  readonly assessedOn: string;
  readonly hoursLogged: string;
  readonly driftMkPerH: string;
  readonly halfBandMk: string;
  readonly periodMin: string;
  readonly resolutionMk: string;
  readonly sensorPlace: string;
  readonly loggerTag: string;
  readonly isDoorTolerant: boolean;
  readonly note: string;
};

type Body = z.input<typeof createAssessment.body>;

/** Reads the draft with the contract's own schema; the errors are by wire field. */
export function readAssessment(draft: AssessmentDraft): {
  body: Body | null;
  errors: ReadonlyMap<string, string>;
} {
  const errors = new Map<string, string>();
  const figure = (text: string, field: string, factor: number): number => {
    const value = parseFigure(text);
    if (value === undefined) {
      errors.set(field, t.ui.notANumber);
      return Number.NaN;
    }
    return value * factor;
  };
  const candidate = {
    setTemperatureC: figure(draft.setTemperatureC, 'setTemperatureC', 1),
    assessedOn: draft.assessedOn,
    hoursLogged: figure(draft.hoursLogged, 'hoursLogged', 1),
    driftKPerH: figure(draft.driftMkPerH, 'driftKPerH', 1e-3),
    halfBandK: figure(draft.halfBandMk, 'halfBandK', 1e-3),
    periodS: draft.periodMin.trim() === '' ? null : figure(draft.periodMin, 'periodS', 60),
    resolutionK: figure(draft.resolutionMk, 'resolutionK', 1e-3),
    sensorPlace: draft.sensorPlace,
    loggerTag: draft.loggerTag.trim() === '' ? null : draft.loggerTag.trim().toUpperCase(),
    isDoorTolerant: draft.isDoorTolerant,
    note: draft.note,
  };
  const parsed = createAssessment.body.safeParse(candidate);
  if (parsed.success) {
    return { body: candidate, errors };
  }
  for (const issue of parsed.error.issues) {
    const field = String(issue.path[0]);
    if (!errors.has(field)) {
      errors.set(field, issue.message);
    }
  }
  return { body: null, errors };
}
