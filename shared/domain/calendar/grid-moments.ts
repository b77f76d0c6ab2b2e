import type { Span } from '#shared/domain/intervals/types.ts';
import { gridMs, roundUpToGrid } from './round-up-to-grid.ts';

/**
 * Every quarter hour of UTC inside a half-open span, in order.
 *
 * @example [...gridMoments({ startMs: 1, endMs: 1_800_001 })] // [900000, 1800000]
 */
export function* gridMoments(span: Span): Generator<number, void> {
  for (let atMs = roundUpToGrid(span.startMs); atMs < span.endMs; atMs += gridMs) {
    yield atMs;
  }
}
