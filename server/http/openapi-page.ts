import express from 'express';
import type { Router } from 'express';
import { contracts } from '#shared/contracts/registry.ts';
import { openApiDocument } from './openapi-document.ts';

/** The description is made at the first call and kept: it changes only with the program. */
export function openApiPage(): Router {
  const router = express.Router();
  let text: string | null = null;
  router.get('/api/openapi.json', (_request, response) => {
    text ??= JSON.stringify(openApiDocument(contracts));
    response.set('Cache-Control', 'no-cache').type('application/json').send(text);
  });
  return router;
}
