import fc from 'fast-check';
import { describe, expect, test } from 'vitest';
import { holdLength, type HoldLengthInput } from '#shared/domain/hold-estimate/hold-length.ts';
import { twoPoleKernel } from '#shared/domain/thermal-error/two-pole-kernel.ts';

const base: HoldLengthInput = {
  startResidualA: 1.05e-5,
  capacitanceF: 14_000,
  entropicCoefficientVPerK: 5e-5,
  lagK: 0.1,
  thermalTimeConstantS: 645,
  timeConstantS: 1320,
  toleranceA: 1.05e-6,
};

function residualA(input: HoldLengthInput, timeS: number): number {
  return (
    input.startResidualA * Math.exp(-timeS / input.timeConstantS) +
    Math.abs(input.capacitanceF * input.entropicCoefficientVPerK * input.lagK) *
      twoPoleKernel({ timeS, firstS: input.thermalTimeConstantS, secondS: input.timeConstantS })
  );
}

const anyHold = fc.record({
  startResidualA: fc.double({ min: 0, max: 1e-3, noNaN: true }),
  capacitanceF: fc.double({ min: 10, max: 1e7, noNaN: true }),
  entropicCoefficientVPerK: fc.double({ min: -5e-4, max: 5e-4, noNaN: true }),
  lagK: fc.constantFrom(0, 0.1, 1),
  thermalTimeConstantS: fc.double({ min: 50, max: 5000, noNaN: true }),
  timeConstantS: fc.double({ min: 50, max: 100_000, noNaN: true }),
  toleranceA: fc.double({ min: 1e-8, max: 1e-4, noNaN: true }),
});

describe('length of the hold', () => {
  test('without a thermal lag it is τ·ln(start/tolerance)', () => {
    expect(holdLength({ ...base, lagK: 0 })).toBeCloseTo(1320 * Math.log(10), 4);
  });

  test('the current stays inside for all later times, and was outside just before', () => {
    fc.assert(
      fc.property(anyHold, (input) => {
        const holdS = holdLength(input);
        for (const later of [0, 1, 10, 100, 1000, 10_000, 100_000]) {
          expect(residualA(input, holdS + later)).toBeLessThanOrEqual(
            input.toleranceA * (1 + 1e-9),
          );
        }
        if (holdS > 0) {
          expect(residualA(input, holdS * (1 - 1e-6))).toBeGreaterThan(
            input.toleranceA * (1 - 1e-9),
          );
        }
      }),
      { numRuns: 300 },
    );
  });

  test('a lag that rises only later still counts', () => {
    const late = { ...base, startResidualA: 0 };
    expect(residualA(late, 0)).toBe(0);
    expect(holdLength(late)).toBeGreaterThan(1320);
  });

  test('equal time constants join the near-equal case', () => {
    const equal = holdLength({ ...base, thermalTimeConstantS: 1320 });
    const near = holdLength({ ...base, thermalTimeConstantS: 1320 * (1 + 1e-7) });
    expect(near).toBeCloseTo(equal, 2);
  });

  test('it never shrinks with a tighter tolerance, a larger dU/dT or a larger mismatch', () => {
    fc.assert(
      fc.property(anyHold, fc.double({ min: 1, max: 10, noNaN: true }), (input, factor) => {
        const holdS = holdLength(input);
        const slack = 1e-6 * holdS + 1e-6;
        const tighter = holdLength({ ...input, toleranceA: input.toleranceA / factor });
        const steeper = holdLength({
          ...input,
          entropicCoefficientVPerK: input.entropicCoefficientVPerK * factor,
        });
        const worse = holdLength({ ...input, startResidualA: input.startResidualA * factor });
        expect(Math.min(tighter, steeper, worse)).toBeGreaterThanOrEqual(holdS - slack);
      }),
      { numRuns: 300 },
    );
  });

  test.each([
    ['toleranceA', 0],
    ['timeConstantS', -1],
    ['capacitanceF', NaN],
    ['startResidualA', -1],
    ['lagK', Infinity],
  ] as const)('%s of %d is refused', (key, value) => {
    expect(() => holdLength({ ...base, [key]: value })).toThrow(RangeError);
  });
});
