import { existsSync, readFileSync } from 'node:fs';
import { join } from 'node:path';
import express from 'express';
import type { Express, Response } from 'express';
import { styleNonceOf } from './security-headers.ts';

/**
 * Serves the built client. Files whose names carry a hash never change and are kept for a year; the
 * page itself is asked for anew each time and carries the nonce for the calendar's style element.
 */
export function serveClient(app: Express, folder: string): void {
  const indexFile = join(folder, 'index.html');
  app.use(
    '/assets',
    express.static(join(folder, 'assets'), { immutable: true, maxAge: '365d', index: false }),
  );
  app.use(express.static(folder, { index: false, maxAge: '1h' }));
  app.get(/^\/(?!api\/|auth\/|problems\/|assets\/).*/, (_request, response, next) => {
    if (!existsSync(indexFile)) {
      next();
      return;
    }
    sendPage(response, readFileSync(indexFile, 'utf8'));
  });
}

function sendPage(response: Response, page: string): void {
  const meta = `<meta name="csp-nonce" content="${styleNonceOf(response)}" />`;
  response
    .set('Cache-Control', 'no-cache')
    .type('html')
    .send(page.replace('<head>', `<head>${meta}`));
}
