import { describe, expect, test } from 'vitest';
import { thinSpace } from '#src/lib/format-number.ts';
import { readSpans, writeSpans } from '#src/features/settings/hours.view.ts';
import { describeValue, fromField, toField } from '#src/features/settings/policy-value.view.ts';

describe('working hours as typed', () => {
  test.each([
    ['08:00-18:00', [{ fromMin: 480, toMin: 1080 }]],
    [
      '8:00 - 12:00, 12:30–24:00',
      [
        { fromMin: 480, toMin: 720 },
        { fromMin: 750, toMin: 1440 },
      ],
    ],
    ['', []],
  ])('%j is read', (text, spans) => {
    expect(readSpans(text)).toEqual(spans);
  });

  test.each([
    '8-18',
    '18:00-08:00',
    '08:00-08:00',
    '08:70-09:00',
    '08:00-25:00',
    '08:00-12:00, 11:00-13:00',
  ])('%j is no list of spans in order', (text) => {
    expect(readSpans(text)).toBeNull();
  });

  test('what is written can be read again', () => {
    const spans = [
      { fromMin: 0, toMin: 375 },
      { fromMin: 600, toMin: 1440 },
    ];
    expect(readSpans(writeSpans(spans))).toEqual(spans);
  });
});

describe('policy values', () => {
  test('are described with their unit', () => {
    expect(describeValue({ kind: 'number', unit: '%' }, 90)).toBe(`90${thinSpace}%`);
    expect(describeValue({ kind: 'days', unit: 'd' }, [30, 14])).toBe(`30, 14${thinSpace}d`);
    expect(describeValue({ kind: 'flag', unit: null }, false)).toBe('no');
  });

  test('come back from their field as what they were', () => {
    expect(fromField('number', toField(0.5))).toBe(0.5);
    expect(fromField('days', toField([30, 14, 7]))).toEqual([30, 14, 7]);
    expect(fromField('flag', toField(true))).toBe(true);
  });

  test('that cannot be read go to the server as typed, which says what is wrong', () => {
    expect(fromField('number', 'many')).toBe('many');
    expect(fromField('days', '7, soon')).toBe('7, soon');
  });
});
