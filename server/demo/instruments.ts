import type { InstrumentKind, InstrumentState } from '#shared/domain/states.ts';
import { known, stamped, type DemoContext } from './demo-context.ts';
import { dayMs } from './demo-days.ts';
import type { People } from './people.ts';
import type { SiteKey, Sites } from './sites.ts';

export type DemoInstrument = {
  readonly id: number;
  readonly tag: string;
  readonly kind: InstrumentKind;
  readonly site: SiteKey;
  readonly custodianId: number;
};
export type InstrumentPlan = {
  readonly tag: string;
  readonly kind: InstrumentKind;
  readonly model: string;
  readonly site: SiteKey;
  readonly room: string;
  readonly parentTag?: string;
  readonly state?: InstrumentState;
  readonly note?: string;
  readonly firmware?: string;
};
/** Writes an instrument's row and remembers it by tag. */
export type Register = {
  readonly byTag: Map<string, DemoInstrument>;
  readonly enter: (plan: InstrumentPlan) => DemoInstrument;
};

export function openRegister(context: DemoContext, sites: Sites, people: People): Register {
  const dice = context.diceFor('instruments');
  const byTag = new Map<string, DemoInstrument>();
  function enter(plan: InstrumentPlan): DemoInstrument {
    const site = sites[plan.site];
    const id = context.number('instruments');
    const state = plan.state ?? 'in-service';
    const boughtMs = context.nowMs - dice.whole(1120, 1140) * dayMs;
    const enteredMs = state === 'awaiting-release' ? context.nowMs - 6 * dayMs : boughtMs;
    const isReleased = state !== 'awaiting-release';
    const custodianId =
      plan.site === 'otterholm' || dice.chance(0.25)
        ? people.secondMetrologist
        : people.metrologist;
    context.rows.instruments.push({
      id,
      tag: plan.tag,
      kind: plan.kind,
      model: plan.model,
      serial: String(dice.whole(20_100, 98_900)),
      firmware: plan.firmware ?? null,
      siteId: site.id,
      roomId: known(site.rooms, plan.room),
      custodianId,
      state,
      releasedById: isReleased ? people.metrologist : null,
      releasedAt: isReleased ? new Date(enteredMs + 9 * dayMs) : null,
      parentId: plan.parentTag === undefined ? null : known(byTag, plan.parentTag).id,
      note: plan.note ?? null,
      ...stamped(enteredMs, state === 'out-of-service' ? context.nowMs - 4 * dayMs : enteredMs),
    });
    const instrument = { id, tag: plan.tag, kind: plan.kind, site: plan.site, custodianId };
    byTag.set(plan.tag, instrument);
    return instrument;
  }
  return { byTag, enter };
}

const standardsRoom = { site: 'larkfen', room: 'Standards room' } as const;

/** Instruments that are never booked: what the others are compared with, and what watches chambers. */
export const supportPlans: readonly InstrumentPlan[] = [
  { ...standardsRoom, tag: 'R01', kind: 'standard', model: 'reference resistor 100 kΩ' },
  { ...standardsRoom, tag: 'R02', kind: 'standard', model: 'reference resistor 10 kΩ' },
  { ...standardsRoom, tag: 'R05', kind: 'standard', model: 'direct-voltage reference 10 V' },
  {
    ...standardsRoom,
    tag: 'R06',
    kind: 'standard',
    model: 'platinum thermometer with bridge, 0.1 mK',
  },
  {
    ...standardsRoom,
    tag: 'K01',
    kind: 'check-standard',
    model: 'check current source 10 µA',
    note: 'Weekly intermediate check of the 20 µA ranges.',
  },
  {
    ...standardsRoom,
    tag: 'K02',
    kind: 'check-standard',
    model: 'check current source 100 µA',
    note: 'Weekly intermediate check of the 200 µA ranges.',
  },
  {
    tag: 'L01',
    kind: 'logger',
    model: 'nine-sensor logger, 1 mK',
    site: 'larkfen',
    room: 'Room 1',
    firmware: '3.2',
  },
  {
    tag: 'L02',
    kind: 'logger',
    model: 'nine-sensor logger, 1 mK',
    site: 'larkfen',
    room: 'Room 2',
    firmware: '3.2',
  },
  {
    tag: 'L03',
    kind: 'logger',
    model: 'nine-sensor logger, 1 mK',
    site: 'larkfen',
    room: 'Room 3',
    firmware: '3.1',
  },
  {
    tag: 'L04',
    kind: 'logger',
    model: 'single-sensor logger, 0.1 K',
    site: 'larkfen',
    room: 'Room 1',
    note: 'Too coarse for small currents.',
  },
  {
    tag: 'L05',
    kind: 'logger',
    model: 'nine-sensor logger, 1 mK',
    site: 'otterholm',
    room: 'Hall A',
    firmware: '3.2',
  },
  {
    tag: 'L06',
    kind: 'logger',
    model: 'single-sensor logger, 0.1 K',
    site: 'otterholm',
    room: 'Hall B',
  },
];
