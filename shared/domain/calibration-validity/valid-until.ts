import type { Span } from '#shared/domain/intervals/types.ts';

/**
 * Until when validity goes on without a gap from an instant; null when it is not valid then.
 * Stretches that touch count as one.
 *
 * @param spans in order, not overlapping
 * @param atMs epoch ms
 * @example validUntil([{ startMs: 0, endMs: 5 }, { startMs: 5, endMs: 9 }], 2) // 9
 */
export function validUntil(spans: readonly Span[], atMs: number): number | null {
  let untilMs: number | null = null;
  for (const span of spans) {
    const fromMs: number = untilMs ?? atMs;
    if (span.startMs <= fromMs && fromMs < span.endMs) {
      untilMs = span.endMs;
    }
  }
  return untilMs;
}
