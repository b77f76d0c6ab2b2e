import { defineRoute } from '#server/http/define-route.ts';
import * as contracts from '#shared/contracts/bookings.contract.ts';
import * as loads from './loads.service.ts';

export const loadsRoutes = [
  defineRoute(contracts.getLoad, ({ deps, actor, site, input }) =>
    loads.getLoad(deps, actor, site, input.params.id),
  ),
  defineRoute(contracts.closeLoad, ({ deps, actor, site, input }) =>
    loads.closeLoad(deps, actor, site, { loadId: input.params.id, ...input.body }),
  ),
  defineRoute(contracts.reopenLoad, ({ deps, actor, site, input }) =>
    loads.reopenLoad(deps, actor, site, { loadId: input.params.id, ...input.body }),
  ),
];
