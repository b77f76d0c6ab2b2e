import type { CalibratedFunction, InstrumentKind } from '#shared/domain/states.ts';
import { known, stamped, type DemoContext } from './demo-context.ts';
import { dayFrom, dayMs, instantOfDay, shiftDay } from './demo-days.ts';
import type { DemoInstrument, Register } from './instruments.ts';
import type { People } from './people.ts';
import type { Sites } from './sites.ts';

/** Days from today on which particular instruments fall due; the others lie further ahead. */
const dueInDays: Readonly<Record<string, number>> = {
  K01: -9,
  M16: -5,
  M07: 1,
  S02: 6,
  M02: 13,
  L03: 12,
  S05: 26,
  R05: 28,
  S03: 4,
};
const intervalMonths: Partial<Record<InstrumentKind, number>> = {
  standard: 24,
  'check-standard': 6,
};

type Provider = { readonly id: number; readonly name: string; readonly prefix: string };

/** Last calendar day on which each instrument counts as calibrated, by tag. */
export type DueDays = ReadonlyMap<string, string>;

export function layCalibrations(
  context: DemoContext,
  register: Register,
  sites: Sites,
  people: People,
): DueDays {
  const dice = context.diceFor('calibrations');
  const providers = layProviders(context);
  const dueDays = new Map<string, string>();

  function record(
    instrument: DemoInstrument,
    at: { readonly performedOn: string; readonly dueOn: string },
    change: Partial<DemoContext['rows']['calibrations'][number]> = {},
  ): number {
    const id = context.number('calibrations');
    const provider = providerOf(instrument, providers);
    const zone = sites[instrument.site].zone;
    const recordedMs = instantOfDay(at.performedOn, 15, zone);
    const isOwn = instrument.custodianId === people.metrologist;
    const serialNo = dice.whole(100, 999);
    context.rows.calibrations.push({
      id,
      instrumentId: instrument.id,
      state: 'approved',
      ...at,
      inHouse: provider === null,
      provider: provider === null ? 'in-house' : provider.name,
      providerId: provider === null ? null : provider.id,
      certificateNumber: `${provider?.prefix ?? 'LF'}-${at.performedOn.slice(2, 4)}-${serialNo}`,
      conformityAsFound: 'conforms',
      conformityAsLeft: 'conforms',
      recordedById: isOwn ? people.metrologist : people.secondMetrologist,
      decidedById: dice.chance(0.6)
        ? people.manager
        : isOwn
          ? people.secondMetrologist
          : people.metrologist,
      decidedAt: new Date(recordedMs + dice.whole(3, 30) * 3_600_000),
      ...stamped(recordedMs),
      ...change,
    });
    return id;
  }

  function scope(
    calibrationId: number,
    instrument: DemoInstrument,
    limitation?: { readonly rangeLabel: string; readonly text: string },
  ): void {
    const ranges = context.rows.meterRanges.filter((range) => range.instrumentId === instrument.id);
    for (const use of functionsOf(instrument)) {
      const parts =
        limitation === undefined || use !== 'measure'
          ? [{ meterRangeId: null, limitation: null }]
          : ranges.map((range) => ({
              meterRangeId: range.id ?? null,
              limitation: range.label === limitation.rangeLabel ? limitation.text : null,
            }));
      for (const part of parts) {
        context.rows.calibrationScopes.push({
          id: context.number('calibrationScopes'),
          calibrationId,
          channelId: null,
          function: use,
          ...part,
        });
      }
    }
  }

  function layDuty(instrument: DemoInstrument, months: number, nextDueOn: string | null): void {
    context.rows.duties.push({
      id: context.number('duties'),
      instrumentId: instrument.id,
      kind: 'calibration',
      intervalMonths: months,
      nextDueOn,
      custodianId: instrument.custodianId,
      ...stamped(context.nowMs - 1090 * dayMs),
    });
  }

  /** One calibration after the other, each a few days before the one before it ran out. */
  function layHistory(instrument: DemoInstrument, months: number): string {
    const zone = sites[instrument.site].zone;
    const lastDueOn = dayFrom(
      context.nowMs,
      dueInDays[instrument.tag] ?? dice.whole(62, months * 30 - 8),
      zone,
    );
    const steps: { performedOn: string; dueOn: string }[] = [];
    let dueOn = lastDueOn;
    const from = dayFrom(context.nowMs, -1095, zone);
    do {
      const performedOn = shiftDay(dueOn, { months: -months });
      steps.unshift({ performedOn, dueOn });
      dueOn = shiftDay(performedOn, { days: dice.whole(2, 12) });
    } while (shiftDay(dueOn, { months: -months }) >= from);
    steps.forEach((step, index) => {
      const isLast = index === steps.length - 1;
      const isOut = instrument.tag === 'S12' && index === 1;
      const id = record(
        instrument,
        step,
        isOut
          ? {
              conformityAsFound: 'does-not-conform',
              note: 'As found 40 ppm beyond the limit at 5 V; adjusted.',
            }
          : {},
      );
      scope(
        id,
        instrument,
        instrument.tag === 'M04' && isLast
          ? { rangeLabel: '2 µA', text: 'not below 0.2 µA: offset drifts with humidity' }
          : undefined,
      );
    });
    return lastDueOn;
  }

  for (const instrument of register.byTag.values()) {
    const months = intervalMonths[instrument.kind] ?? 12;
    if (instrument.kind === 'mainframe') {
      continue;
    }
    const isNew = instrument.tag === 'S17';
    const dueOn = isNew ? null : layHistory(instrument, months);
    layDuty(instrument, months, dueOn);
    if (dueOn !== null) {
      dueDays.set(instrument.tag, dueOn);
    }
  }
  layUndecided(context, { register, sites, people, record, scope });
  return dueDays;
}

/** Records that wait, were sent back or replaced another. */
function layUndecided(
  context: DemoContext,
  tools: {
    readonly register: Register;
    readonly sites: Sites;
    readonly people: People;
    readonly record: (
      instrument: DemoInstrument,
      at: { readonly performedOn: string; readonly dueOn: string },
      change?: Partial<DemoContext['rows']['calibrations'][number]>,
    ) => number;
    readonly scope: (calibrationId: number, instrument: DemoInstrument) => void;
  },
): void {
  const { register, sites, people } = tools;
  function recent(tag: string, daysAgo: number): { performedOn: string; dueOn: string } {
    const zone = sites[known(register.byTag, tag).site].zone;
    const performedOn = dayFrom(context.nowMs, -daysAgo, zone);
    return { performedOn, dueOn: shiftDay(performedOn, { months: 12 }) };
  }
  function add(
    tag: string,
    daysAgo: number,
    change: Partial<DemoContext['rows']['calibrations'][number]>,
  ): number {
    const instrument = known(register.byTag, tag);
    const id = tools.record(instrument, recent(tag, daysAgo), change);
    tools.scope(id, instrument);
    return id;
  }
  const undecided = { decidedById: null, decidedAt: null };
  add('S02', 1, { state: 'awaiting-approval', ...undecided, recordedById: people.metrologist });
  add('M11', 4, {
    state: 'awaiting-approval',
    ...undecided,
    recordedById: people.secondMetrologist,
    conformityAsFound: 'does-not-conform',
    note: 'As found beyond the limit at three of ten points, all on the 2 µA range; adjusted.',
  });
  add('S17', 1, { state: 'draft', ...undecided, recordedById: people.metrologist });
  add('M13', 40, {
    state: 'refused',
    recordedById: people.secondMetrologist,
    decidedById: people.metrologist,
    refusalReason: 'The certificate names another serial number; ask for a corrected one.',
  });
  correct(context, people);
}

/** One record was typed with the wrong certificate number and replaced by a correct one. */
function correct(context: DemoContext, people: People): void {
  const { calibrations, calibrationScopes } = context.rows;
  const index = calibrations.findIndex(
    (row) => row.state === 'approved' && row.inHouse && row.recordedById === people.metrologist,
  );
  const wrong = calibrations[index];
  if (wrong?.id === undefined) {
    throw new RangeError('The demo has no in-house calibration to correct.');
  }
  const id = context.number('calibrations');
  calibrations.push({
    ...wrong,
    id,
    certificateNumber: `${wrong.certificateNumber}-1`,
    replacesId: wrong.id,
    note: 'Replaces a record with a mistyped certificate number.',
  });
  calibrations[index] = { ...wrong, state: 'replaced' };
  for (const scope of calibrationScopes.filter((row) => row.calibrationId === wrong.id)) {
    calibrationScopes.push({
      ...scope,
      id: context.number('calibrationScopes'),
      calibrationId: id,
    });
  }
}

function layProviders(context: DemoContext): readonly Provider[] {
  const made = stamped(context.nowMs - 1120 * dayMs);
  const lines = [
    { name: 'Quellmoor Kalibrierdienst', scope: 'direct voltage, resistance', prefix: 'QK' },
    { name: 'Thornreach Thermometry', scope: 'temperature −40 °C to 120 °C', prefix: 'TT' },
    { name: 'Ostrelle Metrology', scope: 'direct current 1 nA to 10 mA', prefix: 'OM' },
  ];
  return lines.map(({ name, scope, prefix }, index) => {
    const id = context.number('providers');
    context.rows.providers.push({
      id,
      name,
      scope,
      accreditationNo: `CAL-${4100 + index * 37}`,
      expiresOn: dayFrom(context.nowMs, 200 + index * 190, 'utc'),
      ...made,
    });
    return { id, name, prefix };
  });
}

/** Microammeters and check standards are calibrated in-house, everything else goes out. */
function providerOf(instrument: DemoInstrument, providers: readonly Provider[]): Provider | null {
  const [voltage, temperature] = providers;
  switch (instrument.kind) {
    case 'meter':
    case 'check-standard':
      return null;
    case 'chamber':
    case 'logger':
    case 'probe':
      return temperature ?? null;
    default:
      return voltage ?? null;
  }
}

function functionsOf(instrument: DemoInstrument): readonly CalibratedFunction[] {
  if (instrument.tag.startsWith('Q')) {
    return ['source', 'measure'];
  }
  switch (instrument.kind) {
    case 'source':
      return ['source'];
    case 'meter':
      return ['measure'];
    case 'chamber':
    case 'logger':
      return ['temperature'];
    case 'standard':
      return [instrument.tag === 'R06' ? 'temperature' : 'source'];
    default:
      return ['source'];
  }
}
