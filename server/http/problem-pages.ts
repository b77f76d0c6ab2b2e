import express from 'express';
import type { Router } from 'express';
import { isProblemCode, problems } from '#shared/contracts/problems.ts';
import { notFound } from '#server/problem.ts';

/** The page behind the `type` of every problem document. */
export function problemPages(): Router {
  const router = express.Router();
  router.get('/problems/:code', (request, response) => {
    const { code } = request.params;
    if (!isProblemCode(code)) {
      throw notFound('such kind of problem');
    }
    const { title, status } = problems[code];
    response
      .set('Cache-Control', 'public, max-age=3600')
      .type('html')
      .send(
        `<!doctype html><html lang="en"><head><meta charset="utf-8"><title>${title} – Millpond</title></head>` +
          `<body><main><h1>${title}</h1><p>Problem <code>${code}</code>, HTTP status ${status}.</p>` +
          `<p>The answer that named this page says in its <code>detail</code> what happened and what to do.</p></main></body></html>`,
      );
  });
  return router;
}
