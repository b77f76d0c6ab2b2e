import type { SettlingCurve } from '#shared/domain/hold-estimate/types.ts';
import { t } from '#src/texts/t.ts';

/** Lines closer than this share of the drawing run into each other, and so would their names. */
const apartShare = 0.15;

/** Names at the two lines; one for both where the start makes hardly a difference. */
export function nameStarts(curve: Pick<SettlingCurve, 'points' | 'bandHighA'>): {
  readonly lower: string;
  readonly upper: string | undefined;
} {
  const { starts } = t.request;
  const currents = curve.points.flatMap((point) => [point.positiveA, point.negativeA]);
  const height = Math.max(curve.bandHighA, ...currents) - Math.min(0, ...currents);
  const first = curve.points[0];
  const apart = first === undefined ? 0 : Math.abs(first.positiveA - first.negativeA);
  return apart < height * apartShare
    ? { lower: starts.both, upper: undefined }
    : { lower: starts.low, upper: starts.high };
}
