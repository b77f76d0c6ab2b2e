import type { ScopeState } from '#shared/contracts/equipment.contract.ts';

export type ScopeGroup = {
  readonly key: string;
  /** `M07/1–8`, `M07/1, 3`; null for the whole instrument. */
  readonly channels: string | null;
  readonly scope: ScopeState;
};

/** Channels in the same state on the same range are said in one row. */
export function groupScopes(scopes: readonly ScopeState[]): readonly ScopeGroup[] {
  const groups = new Map<string, ScopeState[]>();
  for (const scope of scopes) {
    const key = JSON.stringify([
      scope.function,
      scope.rangeLabel,
      scope.badge,
      scope.dueOn,
      scope.calibrationId,
      scope.limitation,
    ]);
    groups.set(key, [...(groups.get(key) ?? []), scope]);
  }
  return [...groups].flatMap(([key, members]) => {
    const [scope] = members;
    const labels = members
      .map(({ channelLabel }) => channelLabel)
      .filter((label) => label !== null);
    return scope === undefined ? [] : [{ key, scope, channels: joinLabels(labels) }];
  });
}

function joinLabels(labels: readonly string[]): string | null {
  const [first] = labels;
  if (first === undefined) {
    return null;
  }
  const [tag = first] = first.split('/');
  const numbers = labels.map((label) => Number(label.split('/')[1] ?? '0')).sort((a, b) => a - b);
  const low = numbers[0] ?? 0;
  const high = numbers.at(-1) ?? 0;
  const isRun = numbers.length > 2 && high - low === numbers.length - 1;
  return `${tag}/${isRun ? `${low}–${high}` : numbers.join(', ')}`;
}
