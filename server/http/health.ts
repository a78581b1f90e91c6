import { Router } from 'express';
import type pg from 'pg';

/** Whether this process still takes work; false from the first moment of its shutdown on. */
export interface Readiness {
  accepting: boolean;
}

const limitMs = 1_000;

/** For whatever keeps the server alive (/healthz) and whatever sends it work (/readyz). They say nothing else. */
export function health(pool: pg.Pool, readiness: Readiness): Router {
  const router = Router();
  router.get('/healthz', (_request, response) => {
    response.set('Cache-Control', 'no-store').type('text/plain').send('alive\n');
  });
  router.get('/readyz', async (_request, response) => {
    const ready = readiness.accepting && (await databaseAnswers(pool));
    response
      .status(ready ? 200 : 503)
      .set('Cache-Control', 'no-store')
      .type('text/plain')
      .send(ready ? 'ready\n' : 'not ready\n');
  });
  return router;
}

async function databaseAnswers(pool: pg.Pool): Promise<boolean> {
  let timer: NodeJS.Timeout | undefined;
  const late = new Promise<boolean>((resolve) => {
    timer = setTimeout(() => resolve(false), limitMs);
  });
  const asked = pool.query('select 1 from labs limit 1').then(
    () => true,
    () => false,
  );
  const answered = await Promise.race([asked, late]);
  clearTimeout(timer);
  return answered;
}
