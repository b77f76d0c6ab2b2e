export type Scale = (value: number) => number;

/** A straight scale from a span of values to a span of pixels. */
export function linearScale(from: readonly [number, number], to: readonly [number, number]): Scale {
  const span = from[1] - from[0];
  return (value) => (span === 0 ? to[0] : to[0] + ((value - from[0]) / span) * (to[1] - to[0]));
}

/** Round values inside a span: steps of 1, 2 or 5 times a power of ten. */
export function niceTicks(low: number, high: number, wanted: number): readonly number[] {
  if (!(high > low)) {
    return [low];
  }
  const rough = (high - low) / wanted;
  const power = 10 ** Math.floor(Math.log10(rough));
  const step = power * ([1, 2, 5, 10].find((factor) => factor * power >= rough) ?? 10);
  const first = Math.ceil(low / step);
  const count = Math.floor(high / step) - first + 1;
  return Array.from({ length: count }, (_, index) => (first + index) * step);
}

type PlanePoint = { readonly x: number; readonly y: number };

const short = (value: number) => Math.round(value * 100) / 100;

/** A line through points, rounded to hundredths of a pixel. */
export function linePath(points: readonly PlanePoint[]): string {
  return points
    .map(({ x, y }, index) => `${index === 0 ? 'M' : 'L'}${short(x)} ${short(y)}`)
    .join('');
}

/** The closed ground between an upper and a lower line. */
export function bandPath(upper: readonly PlanePoint[], lower: readonly PlanePoint[]): string {
  return upper.length === 0 ? '' : `${linePath([...upper, ...[...lower].reverse()])}z`;
}

/** A line that holds its value until the next step. */
export function stepPoints(steps: readonly PlanePoint[], endX: number): readonly PlanePoint[] {
  return steps.flatMap((step, index) => {
    const nextX = steps[index + 1]?.x ?? endX;
    return [step, { x: nextX, y: step.y }];
  });
}
