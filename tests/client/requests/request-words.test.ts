import { describe, expect, test } from 'vitest';
import type { CellTypeDto } from '#shared/contracts/registers.contract.ts';
import { cautionsOf } from '#src/features/request/cautions.view.ts';
import { lotIsOpen, lotIsSearched, lotWords } from '#src/features/request/lot-words.view.ts';
import { aimText, temperatureText } from '#src/features/request/request-facts.view.ts';

const plain = (text: string) => text.replaceAll('\u202f', ' ');

describe('what a request must reach', () => {
  const aim = { kind: 'settled', badToGoodRatio: 3 } as const;

  test.each([
    [0.1, '± 10 % of the current'],
    [0.055, '± 5.5 % of the current'],
    [0.07, '± 7 % of the current'],
  ])('a fraction of %d reads %s', (fraction, text) => {
    expect(plain(aimText({ ...aim, tolerance: { kind: 'relative', fraction } }))).toBe(text);
  });

  test('an absolute tolerance and a ratio read as they were asked', () => {
    const tolerance = { kind: 'absolute', currentA: 2.4e-6 } as const;
    expect(plain(aimText({ ...aim, tolerance }))).toBe('± 2.40 µA');
    expect(aimText({ kind: 'screening', badToGoodRatio: 2.5, tolerance })).toBe(
      'bad cells leak 2.5 times a good one',
    );
  });

  test('a set temperature stands with its tolerance, or not at all', () => {
    expect(plain(temperatureText({ setTemperatureC: 45, setToleranceK: 0.5 }))).toBe(
      '45.0 °C ± 0.5 K',
    );
    expect(temperatureText({ setTemperatureC: null, setToleranceK: 0.5 })).toBe('–');
  });
});

const lot = {
  id: 21,
  cellTypeId: 7,
  cellTypeName: 'NP35',
  cellIds: [],
  cells: [],
  cellCount: 2,
  stateOfChargePct: 50,
  restedSinceAt: '2026-05-01T09:00:00.000Z',
  storageTemperatureC: 22,
  isDamaged: false,
  bookingId: null,
};

describe('a lot in words', () => {
  test('says what is known and what nobody stated', () => {
    const time = () => 'Fri 1 May 10:00';
    expect(lotWords(lot).what).toBe('2 × NP35');
    expect(plain(lotWords(lot).condition(time))).toBe(
      ', 50 % charge, rested since Fri 1 May 10:00, stored at 22.0 °C.',
    );
    const bare = { ...lot, stateOfChargePct: null, restedSinceAt: null, storageTemperatureC: null };
    expect(lotWords(bare).condition(time)).toBe(', charge not stated, rest not stated.');
    expect(lotWords({ ...lot, cellTypeName: null }).what).toBe('cells not chosen yet');
  });

  test('waits for a place until it is booked or the request is over', () => {
    expect(lotIsOpen({ state: 'submitted' }, lot)).toBe(true);
    expect(lotIsOpen({ state: 'partly-booked' }, { bookingId: 2418 })).toBe(false);
    expect(lotIsOpen({ state: 'withdrawn' }, lot)).toBe(false);
    expect(lotIsOpen({ state: 'done' }, lot)).toBe(false);
  });

  test('is looked for once type, number and temperature are known', () => {
    const request = { state: 'draft', setTemperatureC: 45 } as const;
    expect(lotIsSearched(request, lot)).toBe(true);
    expect(lotIsSearched({ ...request, setTemperatureC: null }, lot)).toBe(false);
    expect(lotIsSearched(request, { ...lot, cellCount: null })).toBe(false);
    expect(lotIsSearched(request, { ...lot, cellTypeId: null })).toBe(false);
    expect(lotIsSearched(request, { ...lot, bookingId: 2418 })).toBe(false);
  });
});

const cellType: CellTypeDto = {
  id: 7,
  name: 'NP35',
  cellClass: 'prismatic',
  format: 'prismatic',
  chemistry: 'nmc',
  capacityAh: 35,
  hazardLevel: 4,
  isReleased: true,
  minTemperatureC: -20,
  maxTemperatureC: 60,
  minVoltageV: 2.7,
  maxVoltageV: 4.2,
  maxHoldStateOfChargePct: 90,
  energyWh: 128,
  measured: null,
};
const choice = { cellType, stateOfChargePct: 50, setTemperatureC: 25, isDamaged: false };

describe('cautions where the choice is made', () => {
  test('are silent for an ordinary choice, and for one that is not made yet', () => {
    expect(cautionsOf(choice)).toEqual([]);
    expect(
      cautionsOf({
        cellType: undefined,
        stateOfChargePct: null,
        setTemperatureC: null,
        isDamaged: false,
      }),
    ).toEqual([]);
  });

  test('speak of charge and heat together, not of either alone', () => {
    const hot = { ...choice, setTemperatureC: 45 };
    expect(cautionsOf(hot)).toEqual([]);
    expect(cautionsOf({ ...choice, stateOfChargePct: 85 })).toEqual([]);
    expect(cautionsOf({ ...hot, stateOfChargePct: 85 })).toHaveLength(1);
    expect(cautionsOf({ ...hot, stateOfChargePct: 85 })[0]).toContain('85 %');
  });

  test('name the limits of the cell type', () => {
    expect(cautionsOf({ ...choice, stateOfChargePct: 95 })[0]).toContain('90 %');
    expect(plain(cautionsOf({ ...choice, setTemperatureC: 70 })[0] ?? '')).toContain('60 °C');
    expect(cautionsOf({ ...choice, cellType: { ...cellType, isReleased: false } })).toHaveLength(1);
  });

  test('tell what a cold unload and a damaged cell ask for', () => {
    expect(cautionsOf({ ...choice, setTemperatureC: 0 })).toHaveLength(1);
    expect(cautionsOf({ ...choice, isDamaged: true })).toHaveLength(1);
  });
});
