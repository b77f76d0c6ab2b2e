import type { LotDto, RequestDto } from '#shared/contracts/requests.contract.ts';
import { formatPercent, formatTemperature } from '#src/lib/format-quantity.ts';
import { t } from '#src/texts/t.ts';

const words = t.request;

/** Whether a lot still waits for a place. */
export function lotIsOpen(
  request: Pick<RequestDto, 'state'>,
  lot: Pick<LotDto, 'bookingId'>,
): boolean {
  return request.state !== 'withdrawn' && request.state !== 'done' && lot.bookingId === null;
}

/** Whether enough is known of it to look for slots. */
export function lotIsSearched(
  request: Pick<RequestDto, 'state' | 'setTemperatureC'>,
  lot: Pick<LotDto, 'bookingId' | 'cellTypeId' | 'cellCount'>,
): boolean {
  return (
    lotIsOpen(request, lot) &&
    lot.cellTypeId !== null &&
    lot.cellCount !== null &&
    request.setTemperatureC !== null
  );
}

/** `2 × NP35` and `, 50 % charge, rested since …, stored at 22.0 °C.` */
export function lotWords(lot: LotDto): {
  readonly what: string;
  readonly condition: (time: (at: string) => string) => string;
} {
  return {
    what:
      lot.cellCount === null || lot.cellTypeName === null
        ? words.lotIncomplete
        : words.lotFacts(lot.cellCount, lot.cellTypeName),
    condition: (time) => {
      const parts = [
        lot.stateOfChargePct === null
          ? words.chargeUnknown
          : words.charge(formatPercent(lot.stateOfChargePct / 100)),
        lot.restedSinceAt === null ? words.restUnknown : words.restedSince(time(lot.restedSinceAt)),
        ...(lot.storageTemperatureC === null
          ? []
          : [words.storedAt(formatTemperature(lot.storageTemperatureC))]),
      ];
      return `, ${parts.join(', ')}.`;
    },
  };
}
