import { describe, expect, test } from 'vitest';
import type { BoardBar, BoardBlock, BoardRow } from '#shared/contracts/board.contract.ts';
import { placeLevelNames } from '#src/components/drawing/tide-line.view.ts';
import { nameBar, nextInRowMs, wordsAfter } from '#src/features/board/board-bar.view.ts';
import { placeInWindow } from '#src/features/board/board-events.view.ts';
import { levelsOf, saidAbove } from '#src/features/board/board-rows.view.ts';

const hours = (hour: number) => `2026-03-02T${String(hour).padStart(2, '0')}:00:00.000Z`;

function bar(change: Partial<BoardBar> = {}): BoardBar {
  return {
    bookingId: 2418,
    rowKey: 'C03/1',
    isVisible: true,
    state: 'confirmed',
    isAtRisk: false,
    atRiskFrom: null,
    atRiskReason: null,
    title: '2418 · 3 × LF-35',
    startAt: hours(9),
    endAt: hours(15),
    holdLikelyEndAt: null,
    phases: [
      { phase: 'connect', startAt: hours(9), endAt: hours(10), setTemperatureC: 25 },
      { phase: 'hold', startAt: hours(10), endAt: hours(14), setTemperatureC: 25 },
      { phase: 'unload', startAt: hours(14), endAt: hours(15), setTemperatureC: 25 },
    ],
    ...change,
  };
}

describe('words of a bar', () => {
  test('cells stand once, on the first row of a booking; a foreign one is only taken', () => {
    const first = bar();
    const second = bar({ rowKey: 'C03/2' });
    expect(nameBar(first, [first, second])).toEqual({ number: '2418', words: '3 × LF-35' });
    expect(nameBar(second, [first, second])).toEqual({ number: '2418', words: '' });
    const foreign = bar({ isVisible: false, title: '' });
    expect(nameBar(foreign, [foreign])).toEqual({ number: '', words: 'taken' });
  });

  test('a bar too short for its number has it behind, as far as there is room', () => {
    const name = { number: '2418', words: '3 × LF-35' };
    expect(wordsAfter(bar(), name, 20, 200)).toEqual({
      number: '2418',
      risk: '',
      words: '3 × LF-35',
    });
    expect(wordsAfter(bar(), name, 20, 60)).toEqual({ number: '2418', risk: '', words: '' });
    expect(wordsAfter(bar(), name, 20, 10)).toBeUndefined();
  });

  test('a bar that carries its number has nothing behind, unless it is at risk', () => {
    const name = { number: '2418', words: '3 × LF-35' };
    expect(wordsAfter(bar(), name, 400, 400)).toBeUndefined();
    const atRisk = bar({ isAtRisk: true, atRiskReason: 'M07 falls due.' });
    expect(wordsAfter(atRisk, name, 400, 400)).toEqual({
      number: '',
      risk: '2418 at risk',
      words: 'M07 falls due.',
    });
    expect(wordsAfter(atRisk, name, 400, 140)).toEqual({
      number: '',
      risk: '2418 at risk',
      words: '',
    });
  });
});

describe('places on the axis', () => {
  const ruling = {
    span: { startMs: Date.parse(hours(8)), endMs: Date.parse(hours(18)) },
    zone: 'UTC',
    width: 1000,
  };

  test('what lies before the window is hidden, what is free reaches to the next thing', () => {
    expect(placeInWindow(bar(), Date.parse(hours(16)), ruling)).toEqual({
      width: 600,
      hiddenLeft: 0,
      room: 100,
    });
    expect(placeInWindow(bar({ startAt: hours(6) }), null, ruling)).toEqual({
      width: 900,
      hiddenLeft: 200,
      room: 300,
    });
    expect(placeInWindow(bar({ endAt: hours(20) }), null, ruling).room).toBe(0);
  });

  test('the next thing is a bar or a block in the same row, also one that already runs', () => {
    const own = bar();
    const later = bar({ bookingId: 2, startAt: hours(17), endAt: hours(18) });
    const elsewhere = bar({ rowKey: 'C03/2', startAt: hours(15), endAt: hours(16) });
    const block = { rowKey: 'C03/1', startAt: hours(12), endAt: hours(20) };
    expect(nextInRowMs(own, [own, later, elsewhere], [])).toBe(Date.parse(hours(17)));
    expect(nextInRowMs(own, [own, later], [block])).toBe(Date.parse(hours(15)));
    expect(nextInRowMs(own, [own, elsewhere], [])).toBeNull();
  });
});

describe('tides and closed stretches', () => {
  test('between corners of one value it is level, between others it slants', () => {
    const corner = (hour: number, setTemperatureC: number) => ({
      at: hours(hour),
      setTemperatureC,
    });
    expect(
      levelsOf([corner(0, 25), corner(8, 25), corner(9, 45), corner(12, 45), corner(13, 25)]),
    ).toEqual([
      { startMs: Date.parse(hours(0)), endMs: Date.parse(hours(8)), temperatureC: 25 },
      { startMs: Date.parse(hours(9)), endMs: Date.parse(hours(12)), temperatureC: 45 },
    ]);
  });

  test('a short level keeps its name and pushes the next one on', () => {
    const level = (x1: number, x2: number, text: string) => ({
      kind: 'level' as const,
      x1,
      x2,
      text,
    });
    const names = placeLevelNames(
      [level(0, 100, '25 °C'), level(110, 120, '60 °C'), level(130, 500, '25 °C')],
      500,
    );
    expect(names.map(({ text }) => text)).toEqual(['25 °C', '60 °C', '25 °C']);
    expect(names[0]?.x).toBe(6);
    const [, short, next] = names;
    expect(short?.x).toBeLessThan(110);
    expect(next?.x).toBeGreaterThanOrEqual((short?.x ?? 0) + 5 * 6.65);
    expect(placeLevelNames([level(0, 8, '60 °C')], 500)).toEqual([]);
  });

  test('a sentence that stands on the folded row is not written again below it', () => {
    const row = (key: string, parentKey: string | null): BoardRow => ({
      key,
      parentKey,
      group: 'chambers',
      label: key,
      note: '',
      badge: null,
      childCount: 0,
      href: '/equipment/C03',
    });
    const block = (rowKey: string, sentence: string): BoardBlock => ({
      rowKey,
      kind: 'outage',
      startAt: hours(9),
      endAt: hours(12),
      sentence,
    });
    const rows = [row('C03', null), row('C03/1', 'C03'), row('C03/2', 'C03')];
    const blocks = [block('C03', 'mapping'), block('C03/1', 'mapping'), block('C03/2', 'repair')];
    expect([...saidAbove(rows, blocks)]).toEqual([1]);
  });
});
