import compression from 'compression';
import express, { type Express } from 'express';
import type { Knex } from 'knex';
import type pg from 'pg';
import type { Logger } from 'pino';
import type { Config } from './config';
import { sessionHandler, SessionStore, signInRoutes, toSignIn } from './features/auth';
import { notFound, ProblemError } from './errors';
import { bodyLimitMb } from './http/body-limit';
import { refuseCrossSite } from './http/cross-site';
import { health, type Readiness } from './http/health';
import { pages } from './http/pages';
import { problemHandler } from './http/problems';
import { pruneRateLimits } from './http/prune-rate-limits';
import { limitCalls, limitSignIns, limitUploads } from './http/rate-limits';
import { requestId } from './http/request-id';
import { requestLog } from './http/request-log';
import { apiRouter } from './http/router';
import { securityHeaders } from './http/security-headers';
import { uploads } from './http/uploads';
import { allRoutes } from './routes';

interface AppParts {
  readonly config: Config;
  readonly database: Knex;
  readonly sidePool: pg.Pool;
  readonly logger: Logger;
  readonly readiness: Readiness;
  /** Where the built client lies. */
  readonly pagesDirectory: string;
  /** Whether this process removes old sessions and counts from time to time. */
  readonly prunes: boolean;
}

export interface App {
  readonly app: Express;
  readonly close: () => void;
}

/** The whole server but for its socket. */
export function createApp(parts: AppParts): App {
  const { config, database, sidePool, logger, readiness } = parts;
  const app = express();
  app.disable('x-powered-by');
  // Drafts carry ETags of their own; hashing each answer that nothing may keep would be work for nobody.
  app.set('etag', false);
  app.set('query parser', 'simple');
  app.set('trust proxy', config.trustedProxies);

  app.use(requestId, requestLog(logger), securityHeaders(config.secure));
  app.use(health(sidePool, readiness));
  app.use(compression({ threshold: 1024 }));

  const store = new SessionStore(
    sidePool,
    (error) => logger.warn({ err: error }, 'the session store failed'),
    parts.prunes,
  );
  const session = sessionHandler(config, store);
  const stopPruning = parts.prunes
    ? pruneRateLimits(sidePool, (error) => logger.warn({ err: error }, 'old rate limits stayed'))
    : () => undefined;

  app.use(['/api', '/auth'], (_request, response, next) => {
    response.set('Cache-Control', 'no-store');
    next();
  });
  app.use('/auth', limitSignIns(sidePool, config), session);
  app.use(signInRoutes(config, database, logger));
  app.use(
    '/auth',
    (error: unknown, _request: express.Request, response: express.Response, next: express.NextFunction) => {
      // A browser is on its way here, not a program: it gets a page in every case.
      if (response.headersSent) {
        next(error);
        return;
      }
      const tooMany = error instanceof ProblemError && error.code === 'too-many-requests';
      if (!tooMany) logger.error({ err: error }, 'a sign-in failed');
      toSignIn(response, tooMany ? 'too-many' : 'failed');
    },
  );

  app.use(
    '/api/v1',
    refuseCrossSite(config.publicOrigin),
    session,
    limitCalls(sidePool, config),
    uploads(limitUploads(sidePool, config)),
    express.json({ limit: `${bodyLimitMb}mb`, strict: true, inflate: false }),
    apiRouter(allRoutes(config), { database, logger }),
  );
  app.use(['/api', '/auth'], () => {
    throw notFound();
  });
  app.use(pages(parts.pagesDirectory));
  app.use(problemHandler(logger));
  const close = () => {
    stopPruning();
    store.close();
  };
  return { app, close };
}
