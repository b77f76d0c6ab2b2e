import type { Deps } from '#server/deps.ts';
import { findUnavailabilities } from '#server/features/availability/validity.service.ts';
import type {
  UnavailableSpan,
  SiteValidity,
} from '#server/features/availability/validity.service.ts';
import type { Span } from '#shared/domain/intervals/types.ts';
import type { DrawnRow } from './drawing.service.ts';

export type RowUnavailability = { readonly rowKey: string; readonly span: UnavailableSpan };

/** What is reported as not usable, by the rows it concerns: their unit, instrument or what carries it. */
export async function readUnavailability(
  deps: Pick<Deps, 'db'>,
  input: {
    readonly rows: readonly DrawnRow[];
    readonly unitIds: readonly number[];
    readonly window: Span;
    readonly validity: SiteValidity;
  },
): Promise<RowUnavailability[]> {
  const chains = new Map(
    input.rows.map((row) => [row.instrumentId, input.validity.chainOf(row.instrumentId)] as const),
  );
  const spans = await findUnavailabilities(deps.db, {
    instrumentIds: [...new Set([...chains.values()].flat())],
    unitIds: input.unitIds,
    window: input.window,
  });
  return input.rows.flatMap((row) =>
    spans
      .filter(
        (span) =>
          (span.instrumentId !== null &&
            (chains.get(row.instrumentId)?.includes(span.instrumentId) ?? false)) ||
          (span.unitId !== null && !row.isWhole && row.unitIds.includes(span.unitId)),
      )
      .map((span) => ({ rowKey: row.key, span })),
  );
}
