import { defineRoute } from '#server/http/define-route.ts';
import * as contracts from '#shared/contracts/equipment.contract.ts';
import { createAssessment } from './assessments.service.ts';
import * as equipment from './equipment.service.ts';
import * as states from './service-state.service.ts';
import { getInstrumentWeek } from './week.service.ts';

export const equipmentRoutes = [
  defineRoute(contracts.listInstruments, ({ deps, site, input }) =>
    equipment.listInstruments(deps, site, input.query),
  ),
  defineRoute(contracts.getInstrument, ({ deps, actor, site, input }) =>
    equipment.getInstrument(deps, actor, site, input.params.tag),
  ),
  defineRoute(contracts.getInstrumentWeek, ({ deps, actor, site, input }) =>
    getInstrumentWeek(deps, actor, site, { tag: input.params.tag, ...input.query }),
  ),
  defineRoute(contracts.takeOutOfService, ({ deps, actor, site, input }) =>
    states.takeOutOfService(deps, { actor, site, tag: input.params.tag }, input.body),
  ),
  defineRoute(contracts.returnToService, ({ deps, actor, site, input }) =>
    states.returnToService(deps, { actor, site, tag: input.params.tag }, input.body),
  ),
  defineRoute(contracts.reportBreakdown, ({ deps, actor, site, input }) =>
    states.reportBreakdown(deps, { actor, site, tag: input.params.tag }, input.body),
  ),
  defineRoute(contracts.createAssessment, ({ deps, actor, site, input }) =>
    createAssessment(deps, actor, site, { tag: input.params.tag, ...input.body }),
  ),
];
