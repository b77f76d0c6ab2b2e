import { defineRoute } from '#server/http/define-route.ts';
import * as contracts from '#shared/contracts/board.contract.ts';
import { getBoard } from './board.service.ts';
import { getToday } from './today.service.ts';
import { getWaterline } from './waterline.service.ts';

export const boardRoutes = [
  defineRoute(contracts.getBoard, ({ deps, actor, site, input }) =>
    getBoard(deps, actor, site, input.query),
  ),
  defineRoute(contracts.getWaterline, ({ deps, site }) => getWaterline(deps, site)),
  defineRoute(contracts.getToday, ({ deps, actor, site }) => getToday(deps, actor, site)),
];
