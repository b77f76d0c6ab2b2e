import { fileURLToPath } from 'node:url';
import compression from 'compression';
import express, { Router } from 'express';
import type { Express } from 'express';
import type { Store } from 'express-session';
import { maxFileBytes } from '#shared/contracts/files.contract.ts';
import type { Deps } from './deps.ts';
import { authPages } from './http/auth-pages.ts';
import { serveClient } from './http/client-pages.ts';
import type { Route } from './http/define-route.ts';
import { mountRoutes } from './http/mount-routes.ts';
import { openApiPage } from './http/openapi-page.ts';
import { problemHandler } from './http/problem-handler.ts';
import { problemPages } from './http/problem-pages.ts';
import { signInLimit, writeLimit } from './http/rate-limits.ts';
import { requestLog } from './http/request-scope.ts';
import { giveStyleNonce, securityHeaders } from './http/security-headers.ts';
import { sessions } from './http/sessions.ts';
import { notFound } from './problem.ts';
import { allRoutes } from './routes.ts';

export type AppOptions = {
  readonly deps: Deps;
  readonly sessionStore: Store;
  readonly routes?: readonly Route[];
  /** Where the built client lies. */
  readonly clientFolder?: string;
};

const builtClient = fileURLToPath(new URL('../dist/client', import.meta.url));

/** The whole HTTP side: pages, sign-in and API. It listens nowhere by itself. */
export function createApp(options: AppOptions): Express {
  const { deps, sessionStore, routes = allRoutes, clientFolder = builtClient } = options;
  const app = express();
  app.disable('x-powered-by');
  app.set('trust proxy', 'loopback');
  app.set('query parser', 'simple');
  app.use(requestLog(deps.log));
  app.use(giveStyleNonce, securityHeaders(deps.config));
  app.use(compression());

  app.use('/auth/sign-in', signInLimit());
  app.use(['/auth', '/api'], sessions(deps.config, sessionStore));
  app.use(authPages(deps));

  app.use('/api', writeLimit());
  app.use('/api', express.json({ limit: '1mb' }));
  app.use('/api', fileBody());
  mountRoutes(app, deps, routes);
  app.use(openApiPage());
  app.use(problemPages());
  app.use('/api', () => {
    throw notFound('such address');
  });

  serveClient(app, clientFolder);
  app.use(() => {
    throw notFound('such page');
  });
  app.use(problemHandler(deps.log));
  return app;
}

/** Only a signed-in caller makes the server hold a file in memory. */
function fileBody(): Router {
  const router = Router();
  router.use((request, _response, next) => {
    next(request.session.personId === undefined ? 'router' : undefined);
  });
  router.use(express.raw({ type: 'application/octet-stream', limit: maxFileBytes + 1 }));
  return router;
}
