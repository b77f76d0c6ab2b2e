import type { PathDto } from '#shared/contracts/check.schemas.ts';

/** `S06/1–6`, or `S06/1, 3, 5; Q01/2`: tags of one instrument are said once. */
export function joinTags(tags: readonly string[]): string {
  const groups = new Map<string, number[]>();
  for (const tag of tags) {
    const [instrument = '', channel = ''] = tag.split('/');
    groups.set(instrument, [...(groups.get(instrument) ?? []), Number(channel)]);
  }
  return [...groups]
    .map(([instrument, channels]) => `${instrument}/${joinNumbers(channels)}`)
    .join('; ');
}

function joinNumbers(numbers: readonly number[]): string {
  const sorted = [...numbers].sort((a, b) => a - b);
  const first = sorted[0] ?? 0;
  const last = sorted.at(-1) ?? 0;
  const isRun = sorted.length > 2 && last - first === sorted.length - 1;
  return isRun ? `${first}–${last}` : sorted.join(', ');
}

/** Positions, sources and meters of a set of paths, each as one text. */
export function describePaths(paths: readonly PathDto[]) {
  return {
    positions: joinTags(paths.map((path) => path.positionTag)),
    sources: joinTags(paths.map((path) => path.sourceTag)),
    meters: joinTags(paths.map((path) => path.meterTag)),
  };
}
