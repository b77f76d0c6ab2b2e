import { defineRoute } from '#server/http/define-route.ts';
import { searchSite as contract } from '#shared/contracts/board.contract.ts';
import { searchSite } from './search.service.ts';

export const searchRoutes = [
  defineRoute(contract, async ({ deps, actor, site, input }) => ({
    hits: await searchSite(deps, actor, site, input.query.text),
  })),
];
