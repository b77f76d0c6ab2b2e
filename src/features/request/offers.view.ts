import type { CheckResultDto } from '#shared/contracts/check.schemas.ts';
import type { OfferDto, OffersDto } from '#shared/contracts/offers.contract.ts';
import type { RequestDto } from '#shared/contracts/requests.contract.ts';
import { checkRules } from '#shared/domain/checks/check-rules.ts';
import { checkCodes, type CheckCode } from '#shared/domain/checks/types.ts';

export type OfferRow = {
  readonly key: string;
  /** Its place among the valid ones; null for the earlier one that a rule blocks. */
  readonly place: number | null;
  readonly offer: OfferDto;
  readonly blockedBy: CheckResultDto | null;
  /** The slot the engineer has asked for already. */
  readonly isWished: boolean;
};

export const shownAtFirst = 3;

function isWish(offer: OfferDto, lotId: number, request: Pick<RequestDto, 'proposal'>): boolean {
  const { proposal } = request;
  return (
    proposal?.lotId === lotId &&
    proposal.chamberTag === offer.chamberTag &&
    Date.parse(proposal.startAt) === Date.parse(offer.startAt)
  );
}

/** The blocked earlier slot first, because it is the earliest, then the valid ones in their order. */
export function offerRows(
  found: OffersDto,
  count: number,
  request: Pick<RequestDto, 'proposal'>,
): readonly OfferRow[] {
  const { blockedEarlier } = found;
  const valid = found.offers.slice(0, count).map((offer, index) => ({
    key: `${offer.chamberTag}-${offer.startAt}`,
    place: index + 1,
    offer,
    blockedBy: null,
    isWished: isWish(offer, found.lotId, request),
  }));
  return blockedEarlier === null
    ? valid
    : [
        {
          key: 'blocked',
          place: null,
          offer: blockedEarlier.offer,
          blockedBy: blockedEarlier.blockedBy,
          isWished: false,
        },
        ...valid,
      ];
}

/** How long the server lets these offers be used, whatever the clock of this machine says. */
export function lifetimeMs(found: Pick<OffersDto, 'offeredAt' | 'expiresAt'>): number {
  return Math.max(0, Date.parse(found.expiresAt) - Date.parse(found.offeredAt));
}

/** Counted from when the answer came in, so that a clock that is wrong here does no harm. */
export function isExpired(
  found: Pick<OffersDto, 'offeredAt' | 'expiresAt'>,
  receivedMs: number,
  nowMs: number,
): boolean {
  return nowMs - receivedMs >= lifetimeMs(found);
}

export type SlotAct = 'book' | 'propose';

/**
 * What a person can do with a slot: a submitted request is booked by who may confirm, and its owner
 * can say which slot they would like; a draft is submitted with that wish.
 */
export function slotAct(
  state: RequestDto['state'],
  who: { readonly mayConfirm: boolean; readonly mayPropose: boolean },
): SlotAct | null {
  const isWithSchedulers = state === 'submitted' || state === 'partly-booked';
  if (isWithSchedulers && who.mayConfirm) {
    return 'book';
  }
  return (isWithSchedulers || state === 'draft') && who.mayPropose ? 'propose' : null;
}

export type Way =
  | { readonly kind: 'deviation'; readonly code: CheckCode; readonly sentence: string }
  | { readonly kind: 'instrument'; readonly tag: string; readonly sentence: string }
  | { readonly kind: 'change'; readonly sentence: string }
  | { readonly kind: 'say'; readonly sentence: string };

/** `C03` and `C03/4` both lead to the page of C03. */
const tagPattern = /^([A-Z]\d{2,3})(\/|$)/;

/** The ways out of a check as things one can follow here; what cannot be followed is said. */
export function waysOf(check: CheckResultDto): readonly Way[] {
  return check.waysOut.map(({ kind, sentence, subject }): Way => {
    if (kind === 'deviation') {
      return checkRules[check.code].isNeverLifted
        ? { kind: 'say', sentence }
        : { kind: 'deviation', code: check.code, sentence };
    }
    if (kind === 'change-request') {
      return { kind: 'change', sentence };
    }
    const tag = tagPattern.exec(subject ?? '')?.[1];
    return tag === undefined ? { kind: 'say', sentence } : { kind: 'instrument', tag, sentence };
  });
}

/** Rules that somebody may lift, in the order of the checks. */
export const liftableCodes = checkCodes.filter((code) => !checkRules[code].isNeverLifted);
