/** The limits always stand at the same place, this many limits either side of zero are shown. */
const shownLimits = 1.75;

export type GaugeInput = {
  readonly error: number;
  readonly uncertainty: number;
  /** Half-width of the tolerance, in the unit of the error. */
  readonly limit: number;
  /** How far inside the limit the guard band reaches; 0 for none. */
  readonly guardBand: number;
};

export type GaugeLayout = {
  readonly zero: number;
  readonly lowLimit: number;
  readonly highLimit: number;
  readonly guardWidth: number;
  readonly error: number;
  readonly from: number;
  readonly to: number;
  /** The error lies off the scale and is drawn at its end, open. */
  readonly isBeyond: boolean;
};

/** Error, uncertainty, guard band and limit on one scale `width` px wide. */
export function layOutGauge(input: GaugeInput, width: number): GaugeLayout {
  const zero = width / 2;
  const perLimit = zero / shownLimits;
  const at = (value: number) => zero + (value / input.limit) * perLimit;
  const held = (x: number) => Math.min(width - 4, Math.max(4, x));
  const error = at(input.error);
  return {
    zero,
    lowLimit: at(-input.limit),
    highLimit: at(input.limit),
    guardWidth: Math.min(perLimit, (input.guardBand / input.limit) * perLimit),
    error: held(error),
    from: held(at(input.error - input.uncertainty)),
    to: held(at(input.error + input.uncertainty)),
    isBeyond: held(error) !== error,
  };
}

export type AllowanceVerdict = 'ok' | 'disturbed' | 'cannot-tell';

/** All of the whisker below the upright, all above it, or across it. */
export function judgeWhisker(
  value: number,
  uncertainty: number,
  allowance: number,
): AllowanceVerdict {
  if (value + uncertainty <= allowance) {
    return 'ok';
  }
  return value - uncertainty > allowance ? 'disturbed' : 'cannot-tell';
}
