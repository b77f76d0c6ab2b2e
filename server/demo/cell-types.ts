import type { CellClass, CellFormat, Chemistry } from '#shared/domain/hold-estimate/types.ts';
import { stamped, type DemoContext } from './demo-context.ts';
import { dayMs } from './demo-days.ts';
import type { People } from './people.ts';

export type DemoCellType = {
  readonly id: number;
  readonly name: string;
  readonly cellClass: CellClass;
  readonly format: CellFormat;
  readonly chemistry: Chemistry;
  readonly capacityAh: number;
  readonly nominalV: number;
  readonly hazard: number;
  readonly isReleased: boolean;
  readonly maxTestC: number;
  readonly measured: Measured;
};
type Measured = {
  readonly capacitanceFPerAh?: number;
  readonly resistanceOhm?: number;
  readonly thermalTimeConstantS?: number;
  readonly entropicCoefficientVPerK?: number;
  readonly massKg?: number;
  readonly surfaceM2?: number;
  readonly selfDischargeAPerAh?: number;
};

type Family = Pick<DemoCellType, 'cellClass' | 'format'>;
const coin: Family = { cellClass: 'coin', format: 'coin' };
const pouch: Family = { cellClass: 'small-pouch', format: 'pouch' };
const c18650: Family = { cellClass: 'cylindrical', format: '18650' };
const c21700: Family = { cellClass: 'cylindrical', format: '21700' };
const c4680: Family = { cellClass: 'large-cylindrical', format: '4680' };
const prism: Family = { cellClass: 'prismatic', format: 'prismatic' };
const bigPouch: Family = { cellClass: 'prismatic', format: 'pouch' };
const large: Family = { cellClass: 'large-prismatic', format: 'prismatic' };

/** Voltage limits a maker would state for the chemistry, and what the chemistry's hold may bear. */
const limitsOf: Readonly<
  Record<Chemistry, { minV: number; maxV: number; nominalV: number; maxHold: number }>
> = {
  nmc811: { minV: 2.5, maxV: 4.2, nominalV: 3.65, maxHold: 80 },
  nmc111: { minV: 2.7, maxV: 4.2, nominalV: 3.65, maxHold: 90 },
  nmc: { minV: 2.7, maxV: 4.2, nominalV: 3.65, maxHold: 90 },
  nca: { minV: 2.5, maxV: 4.2, nominalV: 3.6, maxHold: 80 },
  lco: { minV: 3, maxV: 4.2, nominalV: 3.8, maxHold: 80 },
  lfp: { minV: 2.5, maxV: 3.65, nominalV: 3.2, maxHold: 100 },
  lto: { minV: 1.5, maxV: 2.7, nominalV: 2.3, maxHold: 100 },
};

type TypeLine = readonly [
  name: string,
  family: Family,
  chemistry: Chemistry,
  capacityAh: number,
  hazard: number,
  measured?: Measured,
];
const typeLines: readonly TypeLine[] = [
  ['CX20', coin, 'lco', 0.02, 2],
  ['CX45', coin, 'nmc', 0.045, 2, { thermalTimeConstantS: 190 }],
  ['CX120', coin, 'nmc', 0.12, 2],
  ['PX05', pouch, 'nmc111', 0.5, 2],
  ['PX10', pouch, 'lco', 1, 3, { entropicCoefficientVPerK: -2.6e-4 }],
  ['PX12T', pouch, 'lto', 1.2, 1],
  ['PX20', pouch, 'nmc', 2, 3],
  ['CF20', c18650, 'lfp', 2, 2, { massKg: 0.042 }],
  ['CY25', c18650, 'nmc', 2.5, 4],
  ['CY34', c18650, 'nmc811', 3.4, 4, { capacitanceFPerAh: 3900, resistanceOhm: 0.036 }],
  ['CY35', c18650, 'nca', 3.5, 4],
  ['CY48', c21700, 'nca', 4.8, 4],
  ['CY50', c21700, 'nmc811', 5, 4, { entropicCoefficientVPerK: -4.2e-5, massKg: 0.0692 }],
  ['CL20', c4680, 'nmc', 20, 5],
  ['CL23', c4680, 'nmc811', 23, 5, { selfDischargeAPerAh: 2.4e-6 }],
  ['CL26', c4680, 'nca', 26, 5],
  ['NP12', bigPouch, 'nmc111', 12.5, 4, { massKg: 0.27, surfaceM2: 0.0585 }],
  ['TP23', prism, 'lto', 23, 2],
  ['NP35', prism, 'nmc', 35, 4, { thermalTimeConstantS: 1495 }],
  ['LP50', prism, 'lfp', 50, 3],
  ['NP60', prism, 'nmc', 60, 5],
  ['LF105', large, 'lfp', 105, 4],
  ['NP200', large, 'nmc', 200, 6],
  ['LF280', large, 'lfp', 280, 5, { resistanceOhm: 0.00028 }],
];
/** Written down, but not yet released by the safety officer. */
const drafts = new Set(['CX120', 'NP60']);

export function layCellTypes(context: DemoContext, people: People): readonly DemoCellType[] {
  const draftedMs = context.nowMs - 900 * dayMs;
  return typeLines.map(([name, family, chemistry, capacityAh, hazard, measured = {}], index) => {
    const id = context.number('cellTypes');
    const isReleased = !drafts.has(name);
    const limits = limitsOf[chemistry];
    const maxTestC = family.cellClass === 'coin' ? 60 : chemistry === 'lco' ? 45 : 65;
    const releasedMs = isReleased ? draftedMs + (5 + index) * dayMs : null;
    context.rows.cellTypes.push({
      id,
      name,
      ...family,
      chemistry,
      capacityAh,
      minV: limits.minV,
      maxV: limits.maxV,
      nominalV: limits.nominalV,
      minStorageC: -20,
      maxStorageC: chemistry === 'lco' ? 45 : 60,
      minTestC: 0,
      maxTestC,
      maxHoldStateOfChargePct: limits.maxHold,
      ...measured,
      hazardLevel: hazard,
      state: isReleased ? 'released' : 'draft',
      draftedById: index % 2 === 0 ? people.engineer : people.secondEngineer,
      releasedById: isReleased ? people.safety : null,
      releasedAt: releasedMs === null ? null : new Date(releasedMs),
      note: isReleased ? null : 'Waits for the maker’s abuse-test report.',
      ...stamped(draftedMs, releasedMs ?? draftedMs),
    });
    return {
      id,
      name,
      ...family,
      chemistry,
      capacityAh,
      nominalV: limits.nominalV,
      hazard,
      isReleased,
      maxTestC,
      measured,
    };
  });
}

/** Open-circuit voltage at a state of charge, near enough to set a source by. */
export function restVoltage(type: DemoCellType, stateOfChargePct: number): number {
  const isFlat = type.chemistry === 'lfp' || type.chemistry === 'lto';
  const slopeVPerPct = isFlat ? 0.0012 : 0.0078;
  const middleV = type.chemistry === 'lfp' ? 3.29 : type.nominalV;
  return middleV + slopeVPerPct * (stateOfChargePct - 50);
}
