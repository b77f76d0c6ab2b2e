import { defineRoute } from '#server/http/define-route.ts';
import * as contracts from '#shared/contracts/people.contract.ts';
import * as people from './people.service.ts';

export const peopleRoutes = [
  defineRoute(contracts.listPeople, ({ deps, actor, input }) =>
    people.listPeople(deps, actor, input.query),
  ),
  defineRoute(contracts.addGrant, ({ deps, actor, input }) =>
    people.addGrant(deps, actor, input.params.id, input.body),
  ),
  defineRoute(contracts.revokeGrant, ({ deps, actor, input }) =>
    people.revokeGrant(deps, actor, input.params.id, input.params.grantId),
  ),
];
