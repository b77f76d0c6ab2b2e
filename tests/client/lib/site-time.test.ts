import { expect, test } from 'vitest';
import { fromSiteInput, toSiteInput } from '#src/lib/site-time.ts';

test('a field shows and reads the wall time of the site', () => {
  expect(toSiteInput('2026-06-17T07:30:00Z', 'Europe/Dublin')).toBe('2026-06-17T08:30');
  expect(fromSiteInput('2026-06-17T08:30', 'Europe/Dublin')).toEqual({
    kind: 'instant',
    at: '2026-06-17T07:30:00.000Z',
    isRepeated: false,
  });
  expect(fromSiteInput('2026-06-17T08:30', 'America/Toronto')).toEqual({
    kind: 'instant',
    at: '2026-06-17T12:30:00.000Z',
    isRepeated: false,
  });
});

test('a time the clock jumps over is refused', () => {
  expect(fromSiteInput('2026-03-29T01:30', 'Europe/Dublin')).toEqual({ kind: 'gap' });
});

test('a time that happens twice means the earlier one', () => {
  expect(fromSiteInput('2026-10-25T01:30', 'Europe/Dublin')).toEqual({
    kind: 'instant',
    at: '2026-10-25T00:30:00.000Z',
    isRepeated: true,
  });
});

test('an empty field and a broken value are told apart', () => {
  expect(fromSiteInput('', 'Europe/Dublin')).toEqual({ kind: 'empty' });
  expect(fromSiteInput('2026-13-01T10:00', 'Europe/Dublin')).toEqual({ kind: 'invalid' });
});
