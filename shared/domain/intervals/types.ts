/** A half-open span of time `[startMs, endMs)` in epoch milliseconds; touching is not overlapping. */
export type Span = { readonly startMs: number; readonly endMs: number };
