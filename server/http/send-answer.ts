import type { Request, Response } from 'express';
import type { Contract } from '#shared/contracts/define-contract.ts';
import { fileContentSchema } from '#shared/contracts/files.contract.ts';
import type { FileContent } from '#shared/contracts/files.contract.ts';
import type { Answer } from './idempotency.repository.ts';

/** Answers about people's work are never kept by caches on the way. */
export function sendAnswer(
  request: Request,
  response: Response,
  contract: Contract,
  answer: Answer,
): void {
  response.status(answer.status);
  if (contract.response === fileContentSchema) {
    sendFile(request, response, fileContentSchema.parse(answer.body));
    return;
  }
  response.set('Cache-Control', 'private, no-cache');
  if (answer.status === 204) {
    response.end();
  } else {
    response.json(answer.body);
  }
}

/**
 * Sends a stored file so that a browser saves or shows it without running anything in it: fixed media
 * type, no sniffing, sandboxed.
 */
function sendFile(request: Request, response: Response, file: FileContent): void {
  response.set({
    'Content-Type': file.mediaType,
    'Content-Security-Policy': "default-src 'none'; style-src 'unsafe-inline'; sandbox",
    'X-Content-Type-Options': 'nosniff',
    'Cache-Control': 'private, no-cache',
    ETag: `"${file.sha256}"`,
  });
  response.attachment(file.name);
  response.set('Content-Type', file.mediaType);
  if (request.fresh) {
    response.status(304).end();
  } else {
    response.send(Buffer.from(file.bytes));
  }
}
