import type { Express, Request, RequestHandler, Response } from 'express';
import { findSiteByCode } from '#server/features/settings/settings.service.ts';
import type { SignedIn, SiteScope } from '#server/actor.ts';
import type { Deps } from '#server/deps.ts';
import { authenticate, requireCsrfToken } from './authenticate.ts';
import { authorise, isSiteScoped } from './authorise.ts';
import { checkResponse } from './check-response.ts';
import type { OpenCall, Route } from './define-route.ts';
import { answerOnce, hashRequest, requireKey } from './idempotency.ts';
import type { Answer } from './idempotency.repository.ts';
import { scopeOf } from './request-scope.ts';
import { sendAnswer } from './send-answer.ts';

/** Puts the routes of all features on the app. */
export function mountRoutes(app: Express, deps: Deps, routes: readonly Route[]): void {
  for (const route of routes) {
    const method = methods[route.contract.method];
    app[method](route.contract.path, handlerOf(deps, route));
  }
}

const methods = { GET: 'get', POST: 'post', PUT: 'put', PATCH: 'patch', DELETE: 'delete' } as const;

function handlerOf(deps: Deps, route: Route): RequestHandler {
  const { contract } = route;
  return async (request, response) => {
    const scope = scopeOf(request);
    scope.contract = contract.name;
    const actor = await authenticate(deps, request);
    const site = actor !== null && isSiteScoped(contract) ? await siteOf(deps, request) : null;
    authorise(contract, actor, site);
    if (contract.access.kind !== 'public') {
      requireCsrfToken(request, request.get('X-Millpond-Csrf'));
    }
    const call: OpenCall = {
      actor,
      site,
      requestId: scope.requestId,
      deps: { ...deps, requestId: scope.requestId },
      transact: deps.transact,
      csrfToken: request.session.csrfToken ?? null,
      signal: signalOf(response),
      raw: { params: request.params, query: request.query, body: readBody(request) },
    };
    const answer = contract.idempotent
      ? await runOnce(route, call, actor, request.get('Idempotency-Key'))
      : await run(route, call);
    sendAnswer(request, response, contract, answer);
  };
}

async function run(route: Route, call: OpenCall): Promise<Answer> {
  const result = await route.answer(call);
  const body = checkResponse(call.deps, route.contract, result, call.requestId);
  return { status: route.contract.status, body };
}

/** The whole handler joins the transaction of the key; see `answerOnce`. */
async function runOnce(
  route: Route,
  call: OpenCall,
  actor: SignedIn | null,
  givenKey: string | undefined,
): Promise<Answer> {
  if (actor === null) {
    throw new Error(`${route.contract.name} is idempotent and public; keys belong to persons.`);
  }
  const key = requireKey(givenKey);
  const requestHash = hashRequest(route.contract, call.raw);
  return call.deps.transact((tx) => {
    const transact: Deps['transact'] = (work) => work(tx);
    const deps: Deps = { ...call.deps, db: tx, transact };
    const keyed = {
      personId: actor.personId,
      key,
      contract: route.contract.name,
      requestHash,
      at: deps.clock.now(),
    };
    return answerOnce(tx, keyed, () => run(route, { ...call, deps, transact }));
  });
}

async function siteOf(deps: Deps, request: Request): Promise<SiteScope | null> {
  const code = request.params['site'];
  return typeof code === 'string' ? findSiteByCode(deps, code) : null;
}

/** A request without a body has none, whatever the parsers made of it. */
function readBody(request: Request): unknown {
  const body: unknown = request.body;
  return body;
}

function signalOf(response: Response): AbortSignal {
  const controller = new AbortController();
  response.on('close', () => {
    if (!response.writableFinished) {
      controller.abort();
    }
  });
  return controller.signal;
}
