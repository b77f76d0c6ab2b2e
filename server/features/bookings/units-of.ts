import type { PathChoice } from '#shared/domain/checks/types.ts';

/** Every unit that paths take, in id order. */
export function unitsOf(paths: readonly PathChoice[]): number[] {
  return paths
    .flatMap(({ source, meter, position }) => [source.unitId, meter.unitId, position.unitId])
    .toSorted((first, second) => first - second);
}
