import { defineRoute } from '#server/http/define-route.ts';
import * as contracts from '#shared/contracts/settings.contract.ts';
import * as settings from './settings.service.ts';

export const settingsRoutes = [
  defineRoute(contracts.listPolicies, async ({ deps, site }) => ({
    items: await settings.listPolicies(deps, site),
  })),
  defineRoute(contracts.setPolicy, ({ deps, actor, site, input }) =>
    settings.setPolicy(deps, actor, site, { key: input.params.key, ...input.body }),
  ),
  defineRoute(contracts.getWorkingHours, ({ deps, site }) => settings.getWorkingHours(deps, site)),
  defineRoute(contracts.setWorkingHours, ({ deps, actor, site, input }) =>
    settings.setWorkingHours(deps, actor, site, input.body),
  ),
];
