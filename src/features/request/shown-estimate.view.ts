import type { OfferDto } from '#shared/contracts/offers.contract.ts';
import type { EstimateInput } from '#shared/domain/hold-estimate/types.ts';
import { t } from '#src/texts/t.ts';
import type { LotEstimate } from './estimate-input.view.ts';
import { estimateSentence } from './estimate-words.view.ts';
import type { ShownEstimate } from './phase-reasons.view.ts';

const words = t.request;

export type ShownLotEstimate =
  | { readonly kind: 'needs'; readonly sentence: string }
  | {
      readonly kind: 'estimate';
      readonly estimate: ShownEstimate;
      readonly input: EstimateInput | undefined;
      /** Over which wiring it was worked out. */
      readonly over: string;
    };

/**
 * What a lot takes: over the path of its first slot as soon as there is one, over the site's reference
 * wiring where none is found or none can be looked for.
 */
export function estimateToShow(
  first: Pick<OfferDto, 'estimate' | 'chamberTag'> | undefined,
  reference: LotEstimate,
): ShownLotEstimate {
  if (first !== undefined) {
    const over = words.overFirst(first.chamberTag);
    return { kind: 'estimate', estimate: first.estimate, input: undefined, over };
  }
  if (reference.kind === 'needs') {
    return { kind: 'needs', sentence: estimateSentence(reference) };
  }
  const { estimate, input } = reference;
  return { kind: 'estimate', estimate, input, over: words.overWiring(input.wiring.label) };
}
