import { DateTime } from 'luxon';
import type { z } from 'zod';
import { recordCalibration } from '#shared/contracts/calibrations.contract.ts';
import type { InstrumentDto } from '#shared/contracts/equipment.contract.ts';
import type { Conformity } from '#shared/domain/states.ts';

type Scope = InstrumentDto['scopes'][number];

export type RecordDraft = {
  readonly performedOn: string;
  /** Empty until chosen: then it follows the day performed and the interval. */
  readonly dueOn: string;
  readonly provider: string;
  readonly certificateNumber: string;
  readonly conformityAsFound: Conformity;
  readonly conformityAsLeft: Conformity;
  readonly note: string;
  /** Keys of the scopes ticked. */
  readonly ticked: ReadonlySet<string>;
  /** By group of scopes. */
  readonly limitations: ReadonlyMap<string, string>;
  readonly fileId: number | null;
};

export type ScopeGroup = {
  readonly key: string;
  readonly function: Scope['function'];
  readonly rangeLabel: string | null;
  readonly scopes: readonly { readonly key: string; readonly scope: Scope }[];
};

export function scopeKey(scope: Scope): string {
  return `${scope.channelId ?? ''}/${scope.function}/${scope.meterRangeId ?? ''}`;
}

/** One line per function and range, in which the channels are ticked. */
export function groupScopes(scopes: readonly Scope[]): readonly ScopeGroup[] {
  const groups = new Map<string, { key: string; scope: Scope }[]>();
  for (const scope of scopes) {
    const key = `${scope.function} ${scope.rangeLabel ?? ''}`;
    groups.set(key, [...(groups.get(key) ?? []), { key: scopeKey(scope), scope }]);
  }
  return [...groups].flatMap(([key, members]) => {
    const first = members[0]?.scope;
    return first === undefined
      ? []
      : [{ key, function: first.function, rangeLabel: first.rangeLabel, scopes: members }];
  });
}

/** The same day of the month after the interval; the last day of a shorter month. */
export function dueAfter(performedOn: string, months: number): string {
  const day = DateTime.fromISO(performedOn, { zone: 'utc' });
  return day.isValid ? day.plus({ months }).toISODate() : '';
}

type Body = z.input<typeof recordCalibration.body>;

/** Reads the draft with the contract's own schema; the errors are by wire field. */
export function readRecord(
  draft: RecordDraft,
  target: {
    readonly instrument: InstrumentDto;
    readonly dueOn: string;
    readonly replacesId: number | null;
  },
): { body: Body | null; errors: ReadonlyMap<string, string> } {
  const groups = groupScopes(target.instrument.scopes);
  const scopes = groups.flatMap((group) =>
    group.scopes
      .filter(({ key }) => draft.ticked.has(key))
      .map(({ scope }) => {
        const limitation = (draft.limitations.get(group.key) ?? '').trim();
        return {
          channelId: scope.channelId,
          function: scope.function,
          meterRangeId: scope.meterRangeId,
          limitation: limitation === '' ? null : limitation,
        };
      }),
  );
  const body: Body = {
    tag: target.instrument.tag,
    scopes,
    performedOn: draft.performedOn,
    dueOn: target.dueOn,
    provider: draft.provider,
    certificateNumber: draft.certificateNumber,
    conformityAsFound: draft.conformityAsFound,
    conformityAsLeft: draft.conformityAsLeft,
    note: draft.note,
    fileId: draft.fileId,
    ...(target.replacesId === null ? {} : { replacesId: target.replacesId }),
  };
  const parsed = recordCalibration.body.safeParse(body);
  if (parsed.success) {
    return { body, errors: new Map() };
  }
  const errors = new Map<string, string>();
  for (const issue of parsed.error.issues) {
    const field = String(issue.path[0]);
    if (!errors.has(field)) {
      errors.set(field, issue.message);
    }
  }
  return { body: null, errors };
}

/** The error of a field from here or, by pointer, from the server. */
export function fieldError(
  field: string,
  local: ReadonlyMap<string, string>,
  server: ReadonlyMap<string, string>,
): string | undefined {
  const own = local.get(field) ?? server.get(`#/${field}`);
  if (own !== undefined) {
    return own;
  }
  return [...server].find(([pointer]) => pointer.startsWith(`#/${field}/`))?.[1];
}
