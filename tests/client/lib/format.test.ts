import { describe, expect, test } from 'vitest';
import {
  formatDay,
  formatDue,
  formatInstant,
  formatRelativeDays,
  formatSpan,
} from '#src/lib/format-date.ts';
import {
  formatAge,
  formatDuration,
  formatHours,
  formatRemaining,
} from '#src/lib/format-duration.ts';
import { formatNumber, parseFigure } from '#src/lib/format-number.ts';
import {
  formatAh,
  formatBytes,
  formatCapacitanceF,
  formatCurrentA,
  formatPercent,
  formatResistanceOhm,
  formatTemperature,
  formatVoltageV,
  formatWithUncertainty,
  splitQuantity,
} from '#src/lib/format-quantity.ts';

/** Thin spaces are written as `_` below so that the expected strings can be read. */
const shown = (text: string) => text.replaceAll('\u202f', '_');

describe('numbers', () => {
  test.each([
    [9999, 0, '9999'],
    [10000, 0, '10_000'],
    [140000, 0, '140_000'],
    [1234567.25, 2, '1_234_567.25'],
    [-0.5, 2, '−0.50'],
    [-0.0001, 2, '0.00'],
  ])('%d with %d decimals reads %s', (value, decimals, expected) => {
    expect(shown(formatNumber(value, { decimals }))).toBe(expected);
  });

  test('an error carries its sign, zero carries none', () => {
    expect(formatNumber(0.0035, { decimals: 4, signed: true })).toBe('+0.0035');
    expect(formatNumber(0, { decimals: 1, signed: true })).toBe('0.0');
  });

  test.each([
    ['12.5', 12.5],
    ['12,5', 12.5],
    [' 10 000 ', 10000],
    ['10\u202f000', 10000],
    ['−3', -3],
    ['+3', 3],
    ['2e-6', 2e-6],
    ['.5', 0.5],
  ])('the typed figure "%s" is read as %d', (text, expected) => {
    expect(parseFigure(text)).toBe(expected);
  });

  test.each(['', '1,234.5', '1.2.3', 'twelve', '--1', '5 µA', 'Infinity'])(
    'the typed text "%s" is not a figure',
    (text) => {
      expect(parseFigure(text)).toBeUndefined();
    },
  );
});

describe('quantities', () => {
  test.each([
    [480e-6, '480_µA'],
    [0.5e-6, '500_nA'],
    [1.9e-6, '1.90_µA'],
    [12e-12, '12.0_pA'],
    [999.4e-6, '999_µA'],
    [999.6e-6, '1.00_mA'],
    [-1.0052e-6, '−1.01_µA'],
  ])('a current of %d A reads %s', (currentA, expected) => {
    expect(shown(formatCurrentA(currentA))).toBe(expected);
  });

  test('a column keeps its prefix from 0.1 to 999 and no further', () => {
    expect(shown(formatCurrentA(0.5e-6, { prefix: 'µ' }))).toBe('0.500_µA');
    expect(shown(formatCurrentA(0.05e-6, { prefix: 'µ' }))).toBe('50.0_nA');
    expect(shown(formatCurrentA(0, { prefix: 'µ' }))).toBe('0_µA');
  });

  test('decimals follow the uncertainty', () => {
    expect(shown(formatCurrentA(0.2035e-6, { prefix: 'µ', uncertainty: 0.0006e-6 }))).toBe(
      '0.20350_µA',
    );
    expect(shown(formatWithUncertainty(12.3456e-6, 0.561e-6, 'A'))).toBe('12.35 ±_0.56_µA');
  });

  test('figure and unit come apart for a table cell', () => {
    expect(splitQuantity(17.4e-3, 'Ω')).toEqual({ figure: '17.4', unit: 'mΩ' });
  });

  test('each kind of quantity has its form', () => {
    expect(shown(formatTemperature(45))).toBe('45.0_°C');
    expect(shown(formatTemperature(-20, 0))).toBe('−20_°C');
    expect(shown(formatVoltageV(3.28741))).toBe('3.2874_V');
    expect(shown(formatResistanceOhm(10_000))).toBe('10.0_kΩ');
    expect(shown(formatCapacitanceF(140_000))).toBe('140_000_F');
    expect(shown(formatPercent(0.1))).toBe('10_%');
    expect(['35_Ah', '3.5_Ah', '280_Ah', '0.045_Ah']).toEqual(
      [35, 3.5, 280, 0.045].map((capacityAh) => shown(formatAh(capacityAh))),
    );
    expect(shown(formatBytes(12_400_000))).toBe('12_MB');
    expect(shown(formatBytes(1_500))).toBe('1.5_kB');
    expect(shown(formatBytes(12))).toBe('12_B');
  });
});

describe('durations', () => {
  test.each([
    [56_700, '15_h 45_min'],
    [2_700, '45_min'],
    [450, '7_min 30_s'],
    [40, '40_s'],
    [21_600, '6_h 00_min'],
    [3_599.6, '1_h 00_min'],
    [232_200, '64_h 30_min'],
  ])('%d s reads %s', (seconds, expected) => {
    expect(shown(formatDuration(seconds))).toBe(expected);
  });

  test('a column of lengths always says hours and minutes', () => {
    expect(shown(formatHours(2_700))).toBe('0_h 45_min');
    expect(shown(formatHours(7_320))).toBe('2_h 02_min');
  });

  test('ages and what is left are said coarsely', () => {
    expect(shown(formatAge(97 * 86_400))).toBe('97_d');
    expect(shown(formatAge(19 * 3600))).toBe('19_h');
    expect(shown(formatAge(7_800))).toBe('2_h 10_min');
    expect(shown(formatAge(720))).toBe('12_min');
    expect(shown(formatRemaining(37 * 3600))).toBe('1_d 13_h');
    expect(shown(formatRemaining(5 * 86_400))).toBe('5_d');
    expect(shown(formatRemaining(9 * 86_400 + 7200))).toBe('9_d');
    expect(shown(formatRemaining(7_800))).toBe('2_h 10_min');
  });
});

describe('days and times at a site', () => {
  const dublin = { zone: 'Europe/Dublin', currentYear: 2026 };

  test('the year stands only outside the current one', () => {
    expect(formatDay('2026-06-17', { currentYear: 2026 })).toBe('Wed 17 Jun');
    expect(formatDay('2025-06-17', { currentYear: 2026 })).toBe('Tue 17 Jun 2025');
    expect(formatDay('2026-06-17')).toBe('Wed 17 Jun 2026');
  });

  test('an instant is told in the zone of the site', () => {
    expect(formatInstant('2026-06-17T07:30:00Z', dublin)).toBe('Wed 17 Jun 08:30');
    expect(formatInstant('2026-06-17T02:30:00Z', { ...dublin, zone: 'America/Toronto' })).toBe(
      'Tue 16 Jun 22:30',
    );
  });

  test('a span within one day names the day once', () => {
    expect(formatSpan('2026-06-17T09:30:00Z', '2026-06-17T11:00:00Z', dublin)).toBe(
      'Wed 17 Jun 10:30 to 12:00',
    );
    expect(formatSpan('2026-06-17T09:30:00Z', '2026-06-18T07:30:00Z', dublin)).toBe(
      'Wed 17 Jun 10:30 to Thu 18 Jun 08:30',
    );
  });

  test('a due day ends at 24:00', () => {
    expect(formatDue('2026-06-17', { currentYear: 2026 })).toBe('Wed 17 Jun 24:00');
  });

  test.each([
    ['2026-06-16', 'today'],
    ['2026-06-17', 'tomorrow'],
    ['2026-06-15', 'yesterday'],
    ['2026-06-21', 'in 5 d'],
    ['2026-03-11', '97 d ago'],
  ])('%s is %s when today is 16 June', (day, expected) => {
    expect(formatRelativeDays(day, '2026-06-16')).toBe(expected);
  });
});
