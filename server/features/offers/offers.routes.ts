import { defineRoute } from '#server/http/define-route.ts';
import * as contracts from '#shared/contracts/offers.contract.ts';
import { checkPlacement } from './check-placement.service.ts';
import { findOffers } from './offers.service.ts';
import { proposeOffer } from './propose-offer.service.ts';

export const offersRoutes = [
  defineRoute(contracts.findOffers, ({ deps, actor, site, input }) =>
    findOffers(deps, actor, site, {
      requestId: input.params.id,
      lotId: input.params.lotId,
      ...input.query,
    }),
  ),
  defineRoute(contracts.checkPlacement, ({ deps, actor, site, input }) =>
    checkPlacement(deps, actor, site, {
      requestId: input.params.id,
      lotId: input.params.lotId,
      ...input.body,
    }),
  ),
  defineRoute(contracts.proposeOffer, ({ deps, actor, site, input }) =>
    proposeOffer(deps, actor, site, {
      requestId: input.params.id,
      lotId: input.params.lotId,
      ...input.body,
    }),
  ),
];
