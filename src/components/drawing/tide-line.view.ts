import { stepPoints } from './chart-scale.ts';

export type TideStep = { readonly atMs: number; readonly taken: number };
export type SetLevel = {
  readonly startMs: number;
  readonly endMs: number;
  readonly temperatureC: number;
};
export type TimeWindow = { readonly startMs: number; readonly endMs: number };

export function timeScale(window: TimeWindow, width: number): (ms: number) => number {
  const span = window.endMs - window.startMs;
  return (ms) => ((ms - window.startMs) / span) * width;
}

/** Positions taken as points of a step line, cut to the window; `y` maps a count to pixels. */
export function tidePoints(
  steps: readonly TideStep[],
  window: TimeWindow,
  width: number,
  y: (taken: number) => number,
): readonly { x: number; y: number }[] {
  const x = timeScale(window, width);
  const before = steps.filter((step) => step.atMs <= window.startMs).at(-1);
  const inside = steps.filter((step) => step.atMs > window.startMs && step.atMs < window.endMs);
  const points = [
    { x: 0, y: y(before?.taken ?? 0) },
    ...inside.map((step) => ({ x: x(step.atMs), y: y(step.taken) })),
  ];
  return stepPoints(points, width);
}

export type LevelStroke =
  | { readonly kind: 'level'; readonly x1: number; readonly x2: number; readonly text: string }
  | {
      readonly kind: 'slant';
      readonly x1: number;
      readonly x2: number;
      readonly isRising: boolean;
    };

/** The set temperature as level strokes with their values, slanting where it changes. */
export function levelStrokes(
  levels: readonly SetLevel[],
  window: TimeWindow,
  width: number,
  write: (temperatureC: number) => string,
): readonly LevelStroke[] {
  const x = timeScale(window, width);
  const cut = (ms: number) => Math.min(width, Math.max(0, x(ms)));
  const seen = levels.filter(
    (level) => level.endMs > window.startMs && level.startMs < window.endMs,
  );
  return seen.flatMap((level, index): LevelStroke[] => {
    const next = seen[index + 1];
    const stroke: LevelStroke = {
      kind: 'level',
      x1: cut(level.startMs),
      x2: cut(level.endMs),
      text: write(level.temperatureC),
    };
    if (next === undefined || next.startMs <= level.endMs) {
      return [stroke];
    }
    const isRising = next.temperatureC > level.temperatureC;
    return [stroke, { kind: 'slant', x1: stroke.x2, x2: cut(next.startMs), isRising }];
  });
}

export type LevelName = { readonly x: number; readonly text: string };

const monoLetter = 6.65;
const inset = 6;

/**
 * Where the values of levels are written: in the level, pushed on where the name before reaches into
 * it. A short level keeps its name too, because it is the one that stands out; a name that finds no
 * room at all is left out.
 */
export function placeLevelNames(
  strokes: readonly LevelStroke[],
  width: number,
): readonly LevelName[] {
  const names: LevelName[] = [];
  let free = 0;
  for (const stroke of strokes) {
    if (stroke.kind !== 'level') {
      continue;
    }
    const length = stroke.text.length * monoLetter;
    const isShort = stroke.x2 - stroke.x1 < length + 2 * inset;
    const wished = isShort ? stroke.x1 + (stroke.x2 - stroke.x1 - length) / 2 : stroke.x1 + inset;
    const x = Math.max(wished, free);
    const isClear = isShort ? x === wished : x + length <= stroke.x2;
    if (isClear && x + length <= width) {
      names.push({ x, text: stroke.text });
      free = x + length + inset;
    }
  }
  return names;
}
