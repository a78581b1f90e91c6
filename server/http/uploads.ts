import express, { type ErrorRequestHandler, type RequestHandler, Router } from 'express';
import { z } from 'zod';
import { maxFileBytes } from '../../shared/schemas';
import { ProblemError, unauthenticated } from '../errors';

/** Where a file is sent as it is, instead of JSON. */
export const uploadPath = '/labs/:labId/files';

/** Is this the address of an upload? For whoever stands before the router. */
export const isUpload = (method: string, path: string): boolean =>
  method === 'POST' && /^\/labs\/[^/]{1,40}\/files$/.test(path);

const tooLarge = z.object({ type: z.literal('entity.too.large') });

const sayLimit: ErrorRequestHandler = (error: unknown, _request, _response, next) => {
  if (!tooLarge.safeParse(error).success) {
    next(error);
    return;
  }
  const most = maxFileBytes / 1024 / 1024;
  next(
    new ProblemError(
      'too-large',
      413,
      `The file is larger than ${most} MB, the most that is kept of one. Nothing was stored.`,
    ),
  );
};

const requireSession: RequestHandler = (request, _response, next) => {
  if (request.session.userId === undefined) throw unauthenticated();
  next();
};

/** Reads an upload's bytes for someone who is signed in; nobody else's are waited for. */
export function uploads(limit: RequestHandler): RequestHandler {
  const router = Router({ caseSensitive: true, strict: true });
  router.post(
    uploadPath,
    requireSession,
    limit,
    express.raw({ type: 'application/octet-stream', limit: maxFileBytes, inflate: false }),
    sayLimit,
  );
  return router;
}
