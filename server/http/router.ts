import { Router } from 'express';
import type { Knex } from 'knex';
import type { Logger } from 'pino';
import { ProblemError } from '../errors';
import type { Route } from './route';
import { sendFile } from './send-file';

interface RouterParts {
  readonly database: Knex;
  readonly logger: Logger;
}

/** Every route of the API, each behind what it declares; other methods at a known address are refused by name. */
export function apiRouter(routes: readonly Route[], parts: RouterParts): Router {
  const router = Router({ caseSensitive: true, strict: true });
  for (const route of routes) {
    router[route.method](route.path, async (request, response) => {
      const { status, etag, body, file } = await route.answer({ request, response, ...parts });
      if (response.headersSent) return;
      response.status(status);
      if (etag !== null) response.set('ETag', etag);
      if (file !== undefined) {
        sendFile(response, file);
        return;
      }
      if (route.response === null || status === 204) {
        response.end();
        return;
      }
      // The client takes the types of these schemas on trust, so an answer is held to its own.
      response.json(route.response.parse(route.present(body)));
    });
  }
  for (const path of new Set(routes.map((route) => route.path))) {
    const methods = routes.filter((route) => route.path === path).map(({ method }) => method.toUpperCase());
    const allow = [...methods, ...(methods.includes('GET') ? ['HEAD'] : [])].join(', ');
    router.all(path, () => {
      throw new ProblemError('method-not-allowed', 405, `This address takes ${allow}.`, {
        headers: { Allow: allow },
      });
    });
  }
  return router;
}
