import { definePublicRoute } from '#server/http/define-route.ts';
import * as contracts from '#shared/contracts/session.contract.ts';
import { getSession } from './session.service.ts';

export const sessionRoutes = [
  definePublicRoute(contracts.getSession, ({ deps, actor, csrfToken }) =>
    getSession(deps, actor, actor === null ? null : csrfToken),
  ),
];
