import { defineRoute } from '#server/http/define-route.ts';
import * as contracts from '#shared/contracts/requests.contract.ts';
import * as changes from './change-request.service.ts';
import { getRequest, listRequests } from './requests.service.ts';

export const requestsRoutes = [
  defineRoute(contracts.listRequests, ({ deps, actor, site, input }) =>
    listRequests(deps, actor, site, input.query),
  ),
  defineRoute(contracts.getRequest, ({ deps, actor, site, input }) =>
    getRequest(deps, actor, site, input.params.id),
  ),
  defineRoute(contracts.createRequest, ({ deps, actor, site, input }) =>
    changes.createRequest(deps, actor, site, input.body),
  ),
  defineRoute(contracts.updateRequest, ({ deps, actor, site, input }) =>
    changes.updateRequest(deps, { actor, site, requestId: input.params.id }, input.body),
  ),
  defineRoute(contracts.submitRequest, ({ deps, actor, site, input }) =>
    changes.submitRequest(deps, { actor, site, requestId: input.params.id }, input.body),
  ),
  defineRoute(contracts.withdrawRequest, ({ deps, actor, site, input }) =>
    changes.withdrawRequest(deps, { actor, site, requestId: input.params.id }, input.body),
  ),
  defineRoute(contracts.declineRequest, ({ deps, actor, site, input }) =>
    changes.declineRequest(deps, { actor, site, requestId: input.params.id }, input.body),
  ),
];
