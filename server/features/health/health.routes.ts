import { definePublicRoute } from '#server/http/define-route.ts';
import * as contracts from '#shared/contracts/health.contract.ts';
import { getHealth } from './health.service.ts';

export const healthRoutes = [definePublicRoute(contracts.getHealth, ({ deps }) => getHealth(deps))];
