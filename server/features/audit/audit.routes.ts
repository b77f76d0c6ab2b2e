import { defineRoute } from '#server/http/define-route.ts';
import { listAuditEvents as contract } from '#shared/contracts/audit.contract.ts';
import { listAuditEvents } from './audit.service.ts';

export const auditRoutes = [
  defineRoute(contract, ({ deps, site, input }) => listAuditEvents(deps, site, input.query)),
];
