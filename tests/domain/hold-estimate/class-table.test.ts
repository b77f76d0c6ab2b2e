import { describe, expect, test } from 'vitest';
import {
  cellClassFigures,
  largeLfpFigures,
  type CellClassFigures,
} from '#shared/domain/hold-estimate/cell-class-figures.ts';
import { chemistryFigures } from '#shared/domain/hold-estimate/chemistry-figures.ts';
import { classifyCell } from '#shared/domain/hold-estimate/classify-cell.ts';
import { findCapacitanceBand } from '#shared/domain/hold-estimate/find-capacitance-band.ts';
import { findEntropicBand } from '#shared/domain/hold-estimate/find-entropic-band.ts';
import { publishedCapacitance } from '#shared/domain/hold-estimate/published-capacitance.ts';
import { holdLength } from '#shared/domain/hold-estimate/hold-length.ts';
import { timeConstant } from '#shared/domain/hold-estimate/time-constant.ts';
import { timeToTolerance } from '#shared/domain/hold-estimate/time-to-tolerance.ts';
import { cellClasses, chemistries } from '#shared/domain/hold-estimate/types.ts';

type Level = 'low' | 'typical' | 'high';

function rowOf(figures: CellClassFigures, level: Level) {
  const capacityAh = figures.capacityAh[level];
  const seriesOhm =
    figures.resistanceOhmAh[level] / capacityAh + figures.externalResistanceOhm[level];
  const tauS = timeConstant({
    capacitanceFPerAh: figures.capacitanceFPerAh[level],
    resistanceOhmAh: figures.resistanceOhmAh[level],
    externalResistanceOhm: figures.externalResistanceOhm[level],
    capacityAh,
  });
  const currentA = 3e-6 * capacityAh;
  const minutes = (mismatchV: number, fraction: number): number =>
    timeToTolerance({
      startResidual: mismatchV / seriesOhm + currentA,
      tolerance: fraction * currentA,
      timeConstantS: tauS,
    }) / 60;
  return {
    capacitanceF: figures.capacitanceFPerAh[level] * capacityAh,
    milliohm: seriesOhm * 1000,
    tauS,
    minutes,
  };
}

type Row = readonly [CellClassFigures, Level, number, number, number, readonly number[]];

const rows: readonly Row[] = [
  [cellClassFigures.coin, 'low', 60, 1100, 66, [3, 3, 6, 7, 8, 9]],
  [cellClassFigures.coin, 'typical', 180, 967, 174, [7, 9, 15, 17, 19, 21]],
  [cellClassFigures.coin, 'high', 720, 1500, 1080, [41, 54, 69, 82, 95, 107]],
  [cellClassFigures['small-pouch'], 'low', 1500, 170, 255, [10, 13, 19, 22, 25, 28]],
  [cellClassFigures['small-pouch'], 'typical', 4000, 220, 880, [34, 44, 54, 64, 75, 85]],
  [cellClassFigures['small-pouch'], 'high', 12_000, 250, 3000, [115, 150, 157, 192, 217, 252]],
  [cellClassFigures.cylindrical, 'low', 7500, 74, 555, [21, 28, 35, 42, 49, 55]],
  [cellClassFigures.cylindrical, 'typical', 14_000, 94.3, 1320, [51, 66, 75, 90, 104, 119]],
  [cellClassFigures.cylindrical, 'high', 30_000, 120, 3600, [138, 180, 183, 225, 251, 293]],
  [cellClassFigures['large-cylindrical'], 'low', 60_000, 13.5, 810, [31, 40, 48, 57, 66, 75]],
  [
    cellClassFigures['large-cylindrical'],
    'typical',
    92_000,
    25.2,
    2320,
    [89, 116, 119, 145, 163, 190],
  ],
  [
    cellClassFigures['large-cylindrical'],
    'high',
    156_000,
    32.7,
    5100,
    [196, 255, 245, 304, 331, 390],
  ],
  [cellClassFigures.prismatic, 'low', 30_000, 27, 810, [31, 40, 48, 57, 66, 75]],
  [cellClassFigures.prismatic, 'typical', 140_000, 17.4, 2440, [94, 122, 124, 152, 170, 198]],
  [cellClassFigures.prismatic, 'high', 360_000, 15.3, 5520, [212, 276, 262, 326, 353, 416]],
  [cellClassFigures['large-prismatic'], 'low', 300_000, 4.7, 1410, [54, 70, 75, 91, 103, 120]],
  [
    cellClassFigures['large-prismatic'],
    'typical',
    800_000,
    6.6,
    5280,
    [203, 264, 239, 300, 314, 375],
  ],
  [cellClassFigures['large-prismatic'], 'high', 1.8e6, 8.7, 15_600, [599, 779, 658, 838, 813, 993]],
];

describe('class table (derived here)', () => {
  test.each(rows)('$0.label, %s', (figures, level, capacitanceF, milliohm, tauS, minutes) => {
    const row = rowOf(figures, level);
    expect(row.capacitanceF).toBeCloseTo(capacitanceF, 6);
    expect(Math.abs(row.milliohm / milliohm - 1)).toBeLessThan(0.011);
    expect(row.tauS).toBeCloseTo(tauS, 6);
    const found = [0, 2e-6, 1e-5].flatMap((mismatchV) => [
      row.minutes(mismatchV, 0.1),
      row.minutes(mismatchV, 0.05),
    ]);
    found.forEach((value, index) => {
      expect(Math.abs(value - (minutes[index] ?? NaN))).toBeLessThan(0.51);
    });
  });

  test.each([
    ['low', 12_200],
    ['typical', 37_800],
    ['high', 105_600],
  ] as const)('280 Ah LFP on the plateau, %s', (level, tauS) => {
    expect(rowOf(largeLfpFigures, level).tauS).toBeCloseTo(tauS, 6);
  });

  test('common practice: 30 min-2 h for cylindrical cells, 1-2 h for 10-60 Ah, to 10 %', () => {
    for (const cellClass of ['cylindrical', 'large-cylindrical'] as const) {
      const minutes = rowOf(cellClassFigures[cellClass], 'typical').minutes(0, 0.1);
      expect(minutes).toBeGreaterThanOrEqual(30);
      expect(minutes).toBeLessThanOrEqual(120);
    }
    const large = rowOf(cellClassFigures.prismatic, 'typical').minutes(0, 0.1);
    expect(large).toBeGreaterThanOrEqual(60);
    expect(large).toBeLessThanOrEqual(120);
  });

  test('every class has figures in order, with a source', () => {
    for (const cellClass of cellClasses) {
      const { capacitanceFPerAh, resistanceOhmAh, source } = cellClassFigures[cellClass];
      for (const range of [capacitanceFPerAh, resistanceOhmAh]) {
        expect(range.low).toBeLessThanOrEqual(range.typical);
        expect(range.typical).toBeLessThanOrEqual(range.high);
      }
      expect(source).not.toBe('');
    }
  });

  test.each([
    ['18650', 3.5, 'cylindrical'],
    ['4680', 23, 'large-cylindrical'],
    ['pouch', 1, 'small-pouch'],
    ['pouch', 35, 'prismatic'],
    ['prismatic', 280, 'large-prismatic'],
    ['coin', 0.05, 'coin'],
  ] as const)('a %s cell of %d Ah is %s', (format, capacityAh, cellClass) => {
    expect(classifyCell(format, capacityAh)).toBe(cellClass);
  });
});

describe('chemistry table', () => {
  test('every chemistry has bands up to full charge, and no bound below its default', () => {
    for (const chemistry of chemistries) {
      const { capacitance, entropic } = chemistryFigures[chemistry];
      expect(capacitance.at(-1)?.belowPct).toBe(Infinity);
      expect(entropic.at(-1)?.belowPct).toBe(Infinity);
      for (const band of entropic) {
        expect(band.boundVPerK).toBeGreaterThanOrEqual(Math.abs(band.defaultVPerK));
      }
    }
  });

  test('LFP needs its state of charge, others do not', () => {
    expect(findCapacitanceBand('lfp', null)).toBeNull();
    expect(findCapacitanceBand('lfp', 22)?.capacitanceFPerAh.typical).toBe(8000);
    expect(findCapacitanceBand('lfp', 50)?.capacitanceFPerAh.typical).toBe(30_000);
    expect(findCapacitanceBand('nmc811', null)?.capacitanceFPerAh.typical).toBe(4000);
  });

  test('a missing state of charge takes the widest bound of dU/dT', () => {
    expect(findEntropicBand('nmc811', null).boundVPerK).toBe(4.5e-4);
    expect(findEntropicBand('nmc811', 50).boundVPerK).toBe(1.5e-4);
    expect(() => findEntropicBand('nmc811', 101)).toThrow(RangeError);
  });

  test('the published LFP and LCO points lie inside the default ranges (BPX set, Ai 2020)', () => {
    const lco = publishedCapacitance.find((curve) => curve.source.startsWith('Ai 2020'));
    expect(lco?.points).toHaveLength(6);
    for (const point of lco?.points ?? []) {
      const range = findCapacitanceBand('lco', point.stateOfChargePct)?.capacitanceFPerAh;
      expect(point.capacitanceFPerAh).toBeGreaterThanOrEqual(range?.low ?? NaN);
      expect(point.capacitanceFPerAh).toBeLessThanOrEqual(range?.high ?? NaN);
    }
  });
});

describe('hold after a soak to 0.1 K, to 10 % with no mismatch (derived here)', () => {
  test.each([
    [3.5, 14_000, 1320, 645, 0, 51],
    [3.5, 14_000, 1320, 645, 5e-5, 103],
    [3.5, 14_000, 1320, 645, 1.5e-4, 126],
    [35, 140_000, 2440, 1255, 0, 94],
    [35, 140_000, 2440, 1255, 5e-5, 170],
    [35, 140_000, 2440, 1255, 1.5e-4, 211],
  ])('%d Ah, %d F, τ %d s, τ_th %d s, dU/dT %d: %d min', (...figures) => {
    const [capacityAh, capacitanceF, timeConstantS, thermalS, alphaVPerK, minutes] = figures;
    const holdS = holdLength({
      startResidualA: 3e-6 * capacityAh,
      capacitanceF,
      entropicCoefficientVPerK: alphaVPerK,
      lagK: 0.1,
      thermalTimeConstantS: thermalS,
      timeConstantS,
      toleranceA: 3e-7 * capacityAh,
    });
    expect(Math.round(holdS / 60)).toBe(minutes);
  });
});
