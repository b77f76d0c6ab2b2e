import { defineRoute } from '#server/http/define-route.ts';
import * as contracts from '#shared/contracts/registers.contract.ts';
import * as deviations from './deviations.service.ts';
import { getEstimateBasis } from './estimate-basis.service.ts';
import * as registers from './registers.service.ts';

export const registersRoutes = [
  defineRoute(contracts.listCellTypes, async ({ deps }) => ({
    items: await registers.listCellTypes(deps),
  })),
  defineRoute(contracts.listCells, ({ deps, actor, site, input }) =>
    registers.listCells(deps, actor, site, input.query),
  ),
  defineRoute(contracts.listProjects, async ({ deps, actor, site }) => ({
    items: await registers.listProjects(deps, actor, site),
  })),
  defineRoute(contracts.getEstimateBasis, ({ deps, site }) => getEstimateBasis(deps, site)),
  defineRoute(contracts.listDeviations, async ({ deps, actor, site, input }) => ({
    items: await deviations.listDeviations(deps, { actor, site, id: input.params.id }),
  })),
  defineRoute(contracts.askDeviation, ({ deps, actor, site, input }) =>
    deviations.askDeviation(deps, { actor, site, id: input.params.id }, input.body),
  ),
  defineRoute(contracts.decideDeviation, ({ deps, actor, site, input }) =>
    deviations.decideDeviation(deps, { actor, site, id: input.params.id }, input.body),
  ),
];
