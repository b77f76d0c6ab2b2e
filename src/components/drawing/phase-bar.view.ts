import type { LoadPhase } from '#shared/domain/hold-estimate/types.ts';

export type PhaseName = LoadPhase;

export type BarPhase = {
  readonly phase: PhaseName;
  readonly seconds: number;
  /** The safe margin (P90 less P50): kept until the run proves it is not needed. */
  readonly margin?: boolean | undefined;
};

/** What a part is drawn as; `margin` wins over its phase. */
export type PartName = PhaseName | 'margin';
export type BarPart = {
  readonly part: PartName;
  readonly x: number;
  readonly width: number;
  readonly seconds: number;
};

/**
 * Lays the phases side by side over `width` px, true to their lengths; a phase too short to see
 * still gets `minWidth` px, taken from the longest one. Phases of no length are left out.
 */
export function layOutPhases(
  phases: readonly BarPhase[],
  width: number,
  minWidth = 1,
): readonly BarPart[] {
  const real = phases.filter((phase) => phase.seconds > 0);
  const total = real.reduce((sum, phase) => sum + phase.seconds, 0);
  if (total === 0 || width <= 0) {
    return [];
  }
  const widths = real.map((phase) => Math.max(minWidth, (phase.seconds / total) * width));
  const excess = widths.reduce((sum, each) => sum + each, 0) - width;
  const longest = widths.indexOf(Math.max(...widths));
  const fitted = widths.map((each, index) =>
    index === longest ? Math.max(minWidth, each - excess) : each,
  );
  let x = 0;
  return real.map((phase, index) => {
    const part: BarPart = {
      part: phase.margin ? 'margin' : phase.phase,
      x,
      width: fitted[index] ?? minWidth,
      seconds: phase.seconds,
    };
    x += part.width;
    return part;
  });
}

export type BarWords = { readonly x: number; readonly number: string; readonly words: string };

const monoDigit = 6.65;
const sansLetter = 5.9;

/** The number stands in the solid part if it fits, then the cells if there is room left. */
export function placeBarWords(
  parts: readonly BarPart[],
  number: string,
  words: string,
): BarWords | undefined {
  const solid = parts.filter((part) => part.part === 'hold' || part.part === 'measure');
  const first = solid[0];
  if (first === undefined) {
    return undefined;
  }
  const room = solid.reduce((sum, part) => sum + part.width, 0) - 10;
  const numberWidth = number.length * monoDigit;
  if (numberWidth > room) {
    return undefined;
  }
  const fitsWords = words !== '' && numberWidth + 7 + words.length * sansLetter <= room;
  return { x: first.x + 5, number, words: fitsWords ? words : '' };
}

export type Caption = { readonly part: PartName; readonly x: number };

/** Which parts get their name written below: the longest first, none over another. */
export function placeCaptions(
  parts: readonly BarPart[],
  width: number,
  nameOf: (part: PartName) => string,
): readonly Caption[] {
  const taken: { from: number; to: number }[] = [];
  const placed: Caption[] = [];
  for (const part of [...parts].sort((a, b) => b.seconds - a.seconds)) {
    const length = nameOf(part.part).length * sansLetter;
    const from = Math.max(0, Math.min(part.x + 2, width - length));
    const to = from + length;
    const isFree = taken.every((span) => to + 6 <= span.from || from >= span.to + 6);
    if (isFree) {
      taken.push({ from, to });
      placed.push({ part: part.part, x: from });
    }
  }
  return placed.sort((a, b) => a.x - b.x);
}

export type HourTick = { readonly x: number; readonly hours: number; readonly isNamed: boolean };

const namedSteps = [1, 2, 3, 6, 12, 24, 48, 96] as const;

/** Ticks of an hour axis, named at round steps that leave room for their figures. */
export function hourTicks(totalSeconds: number, width: number, room = 120): readonly HourTick[] {
  const hourWidth = width / (totalSeconds / 3600);
  const named = namedSteps.find((step) => step * hourWidth >= room) ?? 96;
  const step = named >= 3 ? named / 3 : named;
  const count = Math.floor(totalSeconds / 3600 / step) + 1;
  return Array.from({ length: count }, (_, index) => {
    const hours = index * step;
    return { x: hours * hourWidth, hours, isNamed: hours % named === 0 };
  });
}
