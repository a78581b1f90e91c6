import express, { type ErrorRequestHandler, type RequestHandler, Router } from 'express';
import { z } from 'zod';
import { maxDocumentBytes } from '../../shared/cabinet-document';
import { maxFileBytes } from '../../shared/schemas';
import { ProblemError, unauthenticated } from '../errors';

/** Where a file is sent as it is, instead of JSON. */
export const uploadPath = '/labs/:labId/files';

/** Where a cabinet's file is sent as the text in a JSON body, which is longer than any other. */
export const importPath = '/labs/:labId/cabinet/import';
/** JSON writes the quotes and line ends of a text as two characters each. */
const maxImportBodyBytes = 2 * maxDocumentBytes + 10_000;

/** Is this the address of an upload? For whoever stands before the router. */
export const isUpload = (method: string, path: string): boolean =>
  method === 'POST' && /^\/labs\/[^/]{1,40}\/files$/.test(path);

const tooLarge = z.object({ type: z.literal('entity.too.large') });

const sayLimit =
  (message: string): ErrorRequestHandler =>
  (error: unknown, _request, _response, next) => {
    next(tooLarge.safeParse(error).success ? new ProblemError('too-large', 413, message) : error);
  };

const mostMb = (bytes: number): number => bytes / 1024 / 1024;

const requireSession: RequestHandler = (request, _response, next) => {
  if (request.session.userId === undefined) throw unauthenticated();
  next();
};

/** Reads what is longer than other requests, for someone who is signed in; nobody else's is waited for. */
export function uploads(limit: RequestHandler): RequestHandler {
  const router = Router({ caseSensitive: true, strict: true });
  router.post(
    uploadPath,
    requireSession,
    limit,
    express.raw({ type: 'application/octet-stream', limit: maxFileBytes, inflate: false }),
    sayLimit(
      `The file is larger than ${mostMb(maxFileBytes)} MB, the most that is kept of one. Nothing was stored.`,
    ),
  );
  router.post(
    importPath,
    requireSession,
    limit,
    express.json({ limit: maxImportBodyBytes, strict: true, inflate: false }),
    sayLimit(
      `The file is larger than ${mostMb(maxDocumentBytes)} MB, the most that is imported at once. Import it in parts.`,
    ),
  );
  return router;
}
