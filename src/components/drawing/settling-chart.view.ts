import { formatNumber } from '#src/lib/format-number.ts';
import {
  choosePrefix,
  prefixFactor,
  splitQuantity,
  type Prefix,
} from '#src/lib/format-quantity.ts';
import { linearScale, niceTicks, type Scale } from './chart-scale.ts';

export type CurrentPoint = { readonly seconds: number; readonly currentA: number };
export type SettlingCurve = {
  readonly key: string;
  /** Measured is a solid line, predicted a dashed one. */
  readonly kind: 'measured' | 'predicted';
  readonly points: readonly CurrentPoint[];
  /** Written beside the line. */
  readonly label?: string | undefined;
};
export type BandPoint = { readonly seconds: number; readonly lowA: number; readonly highA: number };
export type CurrentLimit = { readonly currentA: number; readonly label: string };

export type SettlingData = {
  readonly curves: readonly SettlingCurve[];
  readonly band?: readonly BandPoint[] | undefined;
  /** The settled window, named on its ground. */
  readonly target?: { lowA: number; highA: number; label: string } | undefined;
  readonly limits?: readonly CurrentLimit[] | undefined;
};

export type SettlingFrame = {
  readonly left: number;
  readonly right: number;
  readonly top: number;
  readonly base: number;
};

export type SettlingLayout = {
  readonly frame: SettlingFrame;
  readonly x: Scale;
  readonly y: Scale;
  readonly unit: string;
  readonly timeTicks: readonly { readonly x: number; readonly hours: number }[];
  readonly currentTicks: readonly { readonly y: number; readonly text: string }[];
};

const hourSteps = [0.5, 1, 2, 3, 6, 12, 24] as const;

function valuesOf(data: SettlingData): readonly number[] {
  return [
    ...data.curves.flatMap((curve) => curve.points.map((point) => point.currentA)),
    ...(data.band ?? []).flatMap((point) => [point.lowA, point.highA]),
    ...(data.target === undefined ? [] : [data.target.lowA, data.target.highA]),
    ...(data.limits ?? []).map((limit) => limit.currentA),
  ];
}

function lastSecond(data: SettlingData): number {
  const ends = [
    ...data.curves.flatMap((curve) => curve.points.map((point) => point.seconds)),
    ...(data.band ?? []).map((point) => point.seconds),
  ];
  return Math.max(1, ...ends);
}

/** Scales and ticks of the settling chart for the width there is; nothing shrinks with it. */
export function layOutSettling(data: SettlingData, width: number, height: number): SettlingLayout {
  const frame = { left: 52, right: width - 10, top: 24, base: height - 34 };
  const values = valuesOf(data);
  const low = Math.min(0, ...values);
  const high = Math.max(...values, low + Number.MIN_VALUE);
  const room = (high - low) * 0.06;
  const end = lastSecond(data);
  const x = linearScale([0, end], [frame.left, frame.right]);
  const y = linearScale([low - room, high + room], [frame.base, frame.top]);
  const prefix = choosePrefix(Math.max(Math.abs(low), Math.abs(high)));
  const hourWidth = (frame.right - frame.left) / (end / 3600);
  const step = hourSteps.find((hours) => hours * hourWidth >= 62) ?? 48;
  const count = Math.floor(end / 3600 / step + 1e-9) + 1;
  return {
    frame,
    x,
    y,
    unit: `${prefix}A`,
    timeTicks: Array.from({ length: count }, (_, index) => ({
      x: x(index * step * 3600),
      hours: index * step,
    })),
    currentTicks: currentTicks(low - room, high + room, y, prefix),
  };
}

function currentTicks(low: number, high: number, y: Scale, prefix: Prefix) {
  const factor = prefixFactor(prefix);
  const ticks = niceTicks(low / factor, high / factor, 5);
  const step = Math.abs((ticks[1] ?? 1) - (ticks[0] ?? 0));
  const decimals = step >= 1 ? 0 : Math.ceil(-Math.log10(step));
  return ticks.map((value) => ({
    y: y(value * factor),
    text: formatNumber(value, { decimals }),
  }));
}

/** The points of a curve thinned for a table: the first, the last and steps between. */
export function thinPoints(
  points: readonly CurrentPoint[],
  wanted: number,
): readonly CurrentPoint[] {
  if (points.length <= wanted) {
    return points;
  }
  const step = (points.length - 1) / (wanted - 1);
  return Array.from({ length: wanted }, (_, index) => points[Math.round(index * step)]).filter(
    (point) => point !== undefined,
  );
}

/** A current for a table cell, in the chart's own unit where that is honest. */
export function tableCurrent(currentA: number): string {
  const { figure, unit } = splitQuantity(currentA, 'A', { digits: 4 });
  return `${figure} ${unit}`;
}
