export type Measured = {
  readonly name: string;
  readonly value: number;
  readonly unit: string;
  readonly limit?: { readonly max: number } | { readonly min: number };
};

/** One figure as one line of JSON on standard output. */
export function report(measured: Measured): void {
  const value = Number(measured.value.toPrecision(4));
  process.stdout.write(`${JSON.stringify({ ...measured, value })}\n`);
}

/** The p-th percentile by the nearest rank. */
export function percentile(values: readonly number[], p: number): number {
  const sorted = [...values].sort((a, b) => a - b);
  return sorted[Math.max(0, Math.ceil((p / 100) * sorted.length) - 1)] ?? Number.NaN;
}
