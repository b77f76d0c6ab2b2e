import fc from 'fast-check';
import { describe, expect, test } from 'vitest';
import { ceilToStep } from '#shared/domain/quantities/ceil-to-step.ts';
import { requireFinite } from '#shared/domain/quantities/require-finite.ts';
import { requireNotNegative } from '#shared/domain/quantities/require-not-negative.ts';
import { requirePositive } from '#shared/domain/quantities/require-positive.ts';
import { requireWithin } from '#shared/domain/quantities/require-within.ts';
import { toKelvin } from '#shared/domain/quantities/to-kelvin.ts';

describe('numbers at the door', () => {
  test('what has a meaning passes unchanged', () => {
    expect(requireFinite(-2, 'x')).toBe(-2);
    expect(requirePositive(3.5, 'x')).toBe(3.5);
    expect(requireNotNegative(0, 'x')).toBe(0);
    expect(requireWithin(50, 'x', { low: 0, high: 50 })).toBe(50);
  });

  test.each([NaN, Infinity, -Infinity])('%d is refused everywhere', (value) => {
    expect(() => requireFinite(value, 'x')).toThrow(RangeError);
    expect(() => requirePositive(value, 'x')).toThrow(RangeError);
    expect(() => requireNotNegative(value, 'x')).toThrow(RangeError);
    expect(() => requireWithin(value, 'x', { low: 0, high: 1 })).toThrow(RangeError);
  });

  test('the sentence names the quantity', () => {
    expect(() => requirePositive(0, 'capacityAh')).toThrow('capacityAh must be greater than zero');
    expect(() => requireNotNegative(-1, 'noiseA')).toThrow('noiseA must not be negative');
    expect(() => requireWithin(2, 'share', { low: 0, high: 1 })).toThrow('share must lie between');
  });
});

describe('units and steps', () => {
  test('Celsius to kelvin, and nothing below absolute zero', () => {
    expect(toKelvin(25)).toBe(298.15);
    expect(() => toKelvin(-273.15)).toThrow(RangeError);
  });

  test('rounding up to a step forgives floating-point dust', () => {
    expect(ceilToStep(61, 60)).toBe(120);
    expect(ceilToStep(60, 60)).toBe(60);
    expect(ceilToStep((0.1 + 0.2) * 10, 3)).toBe(3);
    expect(ceilToStep(0, 60)).toBe(0);
    expect(() => ceilToStep(1, 0)).toThrow(RangeError);
  });

  test('the result is a multiple, not below the value and less than a step above it', () => {
    fc.assert(
      fc.property(
        fc.integer({ min: 0, max: 1e6 }),
        fc.integer({ min: 1, max: 900 }),
        (value, step) => {
          const result = ceilToStep(value, step);
          expect(result % step).toBe(0);
          expect(result).toBeGreaterThanOrEqual(value);
          expect(result - value).toBeLessThan(step);
        },
      ),
    );
  });
});
