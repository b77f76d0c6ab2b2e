import { chamberPlans, type ChamberPlan } from './chamber-plan.ts';
import type { DemoChannel, WirePair } from './channel-plan.ts';
import { stamped, type DemoContext } from './demo-context.ts';
import { dayMs } from './demo-days.ts';
import type { DemoInstrument, Register } from './instruments.ts';
import type { People } from './people.ts';
import type { SiteKey } from './sites.ts';

export type DemoPath = {
  readonly panelId: number;
  readonly leadResistanceOhm: number;
  readonly source: DemoChannel;
  readonly meter: DemoChannel;
  readonly positionUnitId: number;
  readonly positionLabel: string;
};
export type DemoChamber = {
  readonly plan: ChamberPlan;
  readonly instrument: DemoInstrument;
  readonly paths: readonly DemoPath[];
};

type Pools = Readonly<Record<SiteKey, readonly WirePair[]>>;

/** Small cells hang on paired channels, the rest on separate sources and meters. */
const pairedPanels: Readonly<Record<string, readonly number[]>> = { C01: [1, 2], C12: [0, 1] };

export function layChambers(
  context: DemoContext,
  register: Register,
  pools: { readonly separate: Pools; readonly paired: Pools },
  people: People,
): DemoChamber[] {
  const dice = context.diceFor('wiring');
  const taken = new Map<string, number>();
  const entered = stamped(context.nowMs - 1100 * dayMs);

  function takePairs(plan: ChamberPlan, isPaired: boolean, count: number): readonly WirePair[] {
    const key = `${plan.site} ${isPaired ? 'paired' : 'separate'}`;
    const from = taken.get(key) ?? 0;
    const pool = (isPaired ? pools.paired : pools.separate)[plan.site];
    if (from + count > pool.length) {
      throw new RangeError(`The demo has too few channels at ${plan.site} for ${plan.tag}.`);
    }
    taken.set(key, from + count);
    return pool.slice(from, from + count);
  }

  function layPosition(plan: ChamberPlan, chamberId: number, label: string): number {
    const id = context.number('positions');
    context.rows.positions.push({
      id,
      chamberId,
      label,
      formats: [...plan.formats],
      maxAh: plan.maxAh,
      maxHazard: plan.protection,
      holder: plan.holder,
      holderFactor: plan.holderFactor,
      ...entered,
    });
    const unitId = context.number('units');
    context.rows.units.push({
      id: unitId,
      kind: 'chamber-position',
      instrumentId: chamberId,
      positionId: id,
    });
    return unitId;
  }

  function layPanel(
    plan: ChamberPlan,
    chamberId: number,
    place: { readonly index: number; readonly from: number; readonly count: number },
  ): DemoPath[] {
    const isPaired = pairedPanels[plan.tag]?.includes(place.index) ?? false;
    const pairs = takePairs(plan, isPaired, place.count);
    const panelId = context.number('panels');
    const leadResistanceOhm = leadsOf(plan, dice.between(0.9, 1.1));
    context.rows.panels.push({
      id: panelId,
      name: `Panel ${String.fromCodePoint(65 + place.index)}`,
      chamberId,
      leadResistanceOhm,
      guarded: plan.maxAh <= 6,
      recablingAllowed: false,
      ...entered,
    });
    return pairs.map(({ source, meter }, index) => {
      const positionLabel = `${plan.tag}/${place.from + index}`;
      const positionUnitId = layPosition(plan, chamberId, positionLabel);
      for (const unitId of [source.unitId, meter.unitId, positionUnitId]) {
        context.rows.panelMembers.push({ panelId, unitId });
      }
      return { panelId, leadResistanceOhm, source, meter, positionUnitId, positionLabel };
    });
  }

  return chamberPlans.map((plan) => {
    const instrument = register.enter({
      tag: plan.tag,
      kind: 'chamber',
      model: plan.model,
      site: plan.site,
      room: plan.room,
    });
    layChamberSpec(context, plan, instrument.id, entered);
    permitUnattended(context, plan, instrument.id, people);
    let from = 1;
    const paths = plan.wiring.flatMap((count, index) => {
      const laid = layPanel(plan, instrument.id, { index, from, count });
      from += count;
      return laid;
    });
    return { plan, instrument, paths };
  });
}

/** Thick short leads to large cells, thin long ones to small. */
function leadsOf(plan: ChamberPlan, spread: number): number {
  const nominal = plan.maxAh > 100 ? 0.004 : plan.maxAh > 20 ? 0.012 : plan.maxAh > 3 ? 0.06 : 0.12;
  return Math.round(nominal * spread * 1e5) / 1e5;
}

function layChamberSpec(
  context: DemoContext,
  plan: ChamberPlan,
  instrumentId: number,
  entered: ReturnType<typeof stamped>,
): void {
  context.rows.chamberSpecs.push({
    instrumentId,
    minSetTempMdegc: plan.spanC[0] * 1000,
    maxSetTempMdegc: plan.spanC[1] * 1000,
    idleTempMdegc: 25_000,
    rampKPerMin: plan.rampKPerMin,
    strict: plan.strict,
    protectionLevel: plan.protection,
    maxEnergyWh: plan.maxEnergyWh,
    maxCells: plan.positions,
    ...entered,
  });
}

function permitUnattended(
  context: DemoContext,
  plan: ChamberPlan,
  chamberId: number,
  people: People,
): void {
  if (plan.unattendedC === null) {
    return;
  }
  const grantedMs = context.nowMs - 800 * dayMs;
  context.rows.unattendedPermissions.push({
    id: context.number('unattendedPermissions'),
    chamberId,
    cellTypeId: null,
    maxHazard: plan.protection,
    maxTemperatureC: plan.unattendedC,
    maxStateOfChargePct: 60,
    contact: plan.site === 'larkfen' ? 'Larkfen gatehouse, call 4400' : 'Otterholm desk, call 210',
    startsAt: new Date(grantedMs),
    note: 'Smoke extraction and over-temperature cut-out seen working. Site rules come first.',
    grantedById: people.safety,
    ...stamped(grantedMs),
  });
}
