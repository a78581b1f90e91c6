import type { ErrorRequestHandler, Request, Response } from 'express';
import type { Logger } from 'pino';
import { z } from 'zod';
import type { Problem } from '../../shared/schemas';
import { isPassingFailure, sqlState } from '../db/sql-state';
import { invalid, notFound, ProblemError, unavailable } from '../errors';
import { bodyLimitMb } from './body-limit';
import { requestIdOf } from './request-id';

/** Errors of Express's own parsers: they carry a status and a kind, and their text may quote the body. */
const parserError = z.object({ status: z.int().min(400).max(499), type: z.string() });

function asProblem(error: unknown): ProblemError | null {
  if (error instanceof ProblemError) return error;
  if (isPassingFailure(error)) return unavailable();
  const parser = parserError.safeParse(error);
  if (parser.success) return fromParser(parser.data.type, parser.data.status);
  // A percent sign that begins no character, in a path.
  if (error instanceof URIError) return notFound();
  const state = sqlState(error);
  if (state === '22021' || state === '22P05') {
    return invalid([{ path: '', message: 'A text holds a character that cannot be kept. Take it out.' }]);
  }
  return null;
}

function fromParser(type: string, status: number): ProblemError {
  if (type === 'entity.too.large') {
    return new ProblemError(
      'too-large',
      413,
      `The request is larger than ${bodyLimitMb} MB. Send less at once.`,
    );
  }
  if (type === 'entity.parse.failed') {
    return new ProblemError('not-json', 400, 'The body of the request is not JSON.');
  }
  if (status === 415) {
    return new ProblemError('unsupported', 415, 'The body of the request is JSON in UTF-8, not compressed.');
  }
  return new ProblemError('bad-request', 400, 'The request could not be read.');
}

function sendProblem(request: Request, response: Response, problem: ProblemError): void {
  const document: Problem = {
    type: problem.type,
    title: problem.title,
    status: problem.status,
    detail: problem.detail,
    requestId: requestIdOf(request),
    ...(problem.parts.fields === undefined ? {} : { fields: [...problem.parts.fields] }),
    ...(problem.parts.current === undefined ? {} : { current: problem.parts.current }),
  };
  response.status(problem.status);
  response.set('Cache-Control', 'no-store');
  response.set(problem.parts.headers ?? {});
  response.type('application/problem+json').send(JSON.stringify(document));
}

/** The last handler: every error becomes a problem document, and what nobody foresaw is logged and says nothing of itself. */
export function problemHandler(logger: Logger): ErrorRequestHandler {
  return (error: unknown, request, response, next) => {
    const known = asProblem(error);
    if (known === null || known.status >= 500) {
      logger.error({ err: error, requestId: requestIdOf(request) }, 'a request failed');
    }
    if (response.headersSent) {
      next(error);
      return;
    }
    sendProblem(
      request,
      response,
      known ??
        new ProblemError(
          'internal',
          500,
          'The server failed at this request, and nothing was changed. Try again; if it fails again, give the request id to whoever runs Quarterturn.',
        ),
    );
  };
}
