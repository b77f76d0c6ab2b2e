import { defineRoute } from '#server/http/define-route.ts';
import * as contracts from '#shared/contracts/files.contract.ts';
import * as files from './files.service.ts';

export const filesRoutes = [
  defineRoute(contracts.uploadFile, ({ deps, actor, site, input }) =>
    files.uploadFile(deps, actor, site, { ...input.query, bytes: input.body }),
  ),
  defineRoute(contracts.getFile, ({ deps, actor, site, input }) =>
    files.getFile(deps, actor, site, input.params.id),
  ),
  defineRoute(contracts.downloadFile, ({ deps, actor, site, input }) =>
    files.downloadFile(deps, actor, site, input.params.id),
  ),
];
