import { defineRoute } from '#server/http/define-route.ts';
import * as contracts from '#shared/contracts/calibrations.contract.ts';
import { getCalibration, listCalibrations } from './calibrations.service.ts';
import { approveCalibration, refuseCalibration } from './decide-calibration.service.ts';
import { listDuties } from './duties.service.ts';
import { recordCalibration } from './record-calibration.service.ts';

export const calibrationsRoutes = [
  defineRoute(contracts.listDuties, ({ deps, actor, site, input }) =>
    listDuties(deps, actor, site, input.query),
  ),
  defineRoute(contracts.listCalibrations, ({ deps, site, input }) =>
    listCalibrations(deps, site, input.query),
  ),
  defineRoute(contracts.getCalibration, ({ deps, site, input }) =>
    getCalibration(deps, site, input.params.id),
  ),
  defineRoute(contracts.recordCalibration, ({ deps, actor, site, input }) =>
    recordCalibration(deps, actor, site, input.body),
  ),
  defineRoute(contracts.approveCalibration, ({ deps, actor, site, input }) =>
    approveCalibration(deps, { actor, site, id: input.params.id }, input.body),
  ),
  defineRoute(contracts.refuseCalibration, ({ deps, actor, site, input }) =>
    refuseCalibration(deps, { actor, site, id: input.params.id }, input.body),
  ),
];
