import type { IncomingMessage, ServerResponse } from 'node:http';
import { type Logger, pino } from 'pino';
import { pinoHttp } from 'pino-http';
import { z } from 'zod';
import { requestIdOf } from './request-id';

/** JSON lines; what might hold a secret is never put in, and these paths are the net under that. */
export function makeLogger(level: string): Logger {
  return pino({
    level,
    base: null,
    redact: {
      paths: ['*.cookie', '*.authorization', '*.headers', '*.token', '*.access_token', '*.session'],
      censor: '[redacted]',
    },
  });
}

const express = z.object({ originalUrl: z.string() });

/** The address as a log may hold it: no query, since one may hold a code, and no invitation's token. */
function maskedUrl(request: IncomingMessage): string {
  const parsed = express.safeParse(request);
  const url = (parsed.success ? parsed.data.originalUrl : request.url) ?? '';
  const path = url.split('?', 1)[0] ?? '';
  return path.replace(/^\/api\/v1\/invitations\/[^/]+/, '/api/v1/invitations/[redacted]').slice(0, 300);
}

export function requestLog(logger: Logger) {
  return pinoHttp({
    logger,
    genReqId: requestIdOf,
    quietReqLogger: true,
    customLogLevel: (_request, response, error) =>
      error !== undefined || response.statusCode >= 500
        ? 'error'
        : response.statusCode >= 400
          ? 'warn'
          : 'info',
    serializers: {
      req: (request: { id: string; raw: IncomingMessage }) => ({
        id: request.id,
        method: request.raw.method,
        path: maskedUrl(request.raw),
      }),
      res: (response: { raw: ServerResponse }) => ({ status: response.raw.statusCode }),
      // The failure itself is logged where it is turned into an answer.
      err: () => undefined,
    },
  });
}
