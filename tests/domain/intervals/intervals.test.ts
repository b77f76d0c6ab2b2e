import fc from 'fast-check';
import { describe, expect, test } from 'vitest';
import { containsInstant } from '#shared/domain/intervals/contains-instant.ts';
import { containsSpan } from '#shared/domain/intervals/contains-span.ts';
import { findGaps } from '#shared/domain/intervals/find-gaps.ts';
import { intersect } from '#shared/domain/intervals/intersect.ts';
import { mergeSpans } from '#shared/domain/intervals/merge-spans.ts';
import { overlaps } from '#shared/domain/intervals/overlaps.ts';
import { requireSpan } from '#shared/domain/intervals/require-span.ts';
import { spanLengthMs } from '#shared/domain/intervals/span-length-ms.ts';
import { subtractSpans } from '#shared/domain/intervals/subtract-spans.ts';
import type { Span } from '#shared/domain/intervals/types.ts';

const span = (startMs: number, endMs: number): Span => ({ startMs, endMs });
const anySpan = fc
  .tuple(fc.integer({ min: 0, max: 60 }), fc.integer({ min: 0, max: 20 }))
  .map(([startMs, lengthMs]) => span(startMs, startMs + lengthMs));
const isIn = (spans: readonly Span[], instantMs: number): boolean =>
  spans.some((one) => containsInstant(one, instantMs));

describe('half-open spans', () => {
  test('touching spans do not overlap and share nothing', () => {
    expect(overlaps(span(0, 10), span(10, 20))).toBe(false);
    expect(intersect(span(0, 10), span(10, 20))).toBeNull();
    expect(overlaps(span(0, 11), span(10, 20))).toBe(true);
    expect(intersect(span(0, 11), span(10, 20))).toEqual(span(10, 11));
  });

  test('an empty span overlaps nothing, not even what surrounds it', () => {
    expect(overlaps(span(5, 5), span(0, 10))).toBe(false);
  });

  test('the start belongs to a span, the end does not', () => {
    expect(containsInstant(span(0, 10), 0)).toBe(true);
    expect(containsInstant(span(0, 10), 10)).toBe(false);
    expect(containsSpan(span(0, 10), span(0, 10))).toBe(true);
    expect(containsSpan(span(0, 10), span(0, 11))).toBe(false);
  });

  test('merging joins what overlaps or touches and drops what is empty', () => {
    expect(mergeSpans([span(5, 9), span(0, 5), span(20, 20), span(12, 14)])).toEqual([
      span(0, 9),
      span(12, 14),
    ]);
  });

  test('subtracting leaves the rest in order', () => {
    expect(subtractSpans(span(0, 10), [span(3, 4), span(8, 20)])).toEqual([span(0, 3), span(4, 8)]);
    expect(subtractSpans(span(0, 10), [span(-5, 15)])).toEqual([]);
  });

  test('gaps shorter than asked are left out', () => {
    const input = { window: span(0, 10), taken: [span(3, 4)] };
    expect(findGaps({ ...input, minimumMs: 4 })).toEqual([span(4, 10)]);
    expect(findGaps({ ...input, minimumMs: 3 })).toEqual([span(0, 3), span(4, 10)]);
  });

  test('a span without time is refused where time is needed', () => {
    expect(requireSpan(span(0, 1))).toEqual(span(0, 1));
    expect(() => requireSpan(span(1, 1))).toThrow(RangeError);
    expect(() => requireSpan(span(0, NaN))).toThrow(RangeError);
    expect(spanLengthMs(span(5, 15))).toBe(10);
    expect(spanLengthMs(span(15, 5))).toBe(0);
  });
});

describe('properties, instant by instant', () => {
  test('overlapping is symmetric and means a shared instant', () => {
    fc.assert(
      fc.property(anySpan, anySpan, (first, second) => {
        expect(overlaps(first, second)).toBe(overlaps(second, first));
        const shared = Array.from({ length: 81 }, (_, instant) => instant).some(
          (instant) => containsInstant(first, instant) && containsInstant(second, instant),
        );
        expect(overlaps(first, second)).toBe(shared);
        expect(intersect(first, second) !== null).toBe(shared);
      }),
    );
  });

  test('merge keeps every instant; subtract keeps exactly what was not taken', () => {
    fc.assert(
      fc.property(anySpan, fc.array(anySpan, { maxLength: 8 }), (window, taken) => {
        const merged = mergeSpans(taken);
        const left = subtractSpans(window, taken);
        for (let instant = 0; instant < 81; instant += 1) {
          expect(isIn(merged, instant)).toBe(isIn(taken, instant));
          expect(isIn(left, instant)).toBe(
            containsInstant(window, instant) && !isIn(taken, instant),
          );
        }
        merged.forEach((one, index) => {
          const next = merged[index + 1];
          expect(next === undefined || one.endMs < next.startMs).toBe(true);
        });
      }),
    );
  });
});
