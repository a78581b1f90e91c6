import type { Request, RequestHandler } from 'express';
import type pg from 'pg';
import { RateLimiterPostgres, RateLimiterRes } from 'rate-limiter-flexible';
import type { Config } from '../config';
import { ProblemError } from '../errors';

const minute = 60;

function limiterOf(pool: pg.Pool, keyPrefix: string, points: number): RateLimiterPostgres {
  return new RateLimiterPostgres({
    storeClient: pool,
    tableName: 'rate_limits',
    // By migration: the server's role makes no tables.
    tableCreated: true,
    clearExpiredByTimeout: false,
    keyPrefix,
    points,
    duration: minute,
  });
}

async function spend(limiter: RateLimiterPostgres, key: string, points: number): Promise<void> {
  try {
    await limiter.consume(key, points);
  } catch (error) {
    if (!(error instanceof RateLimiterRes)) throw error;
    const seconds = Math.max(1, Math.ceil(error.msBeforeNext / 1000));
    const wait = seconds === 1 ? 'a second' : `${seconds} seconds`;
    throw new ProblemError(
      'too-many-requests',
      429,
      `Too many requests in one minute. Nothing was changed; go on in ${wait}.`,
      { headers: { 'Retry-After': String(seconds) } },
    );
  }
}

/** Sign-ins by address: before signing in nothing else is known of anyone. */
export function limitSignIns(pool: pg.Pool, config: Pick<Config, 'signInsPerMinute'>): RequestHandler {
  const limiter = limiterOf(pool, 'sign-in', config.signInsPerMinute);
  return async (request, _response, next) => {
    await spend(limiter, request.ip ?? 'unknown', 1);
    next();
  };
}

/**
 * Calls of the API by person, so that a lab behind one address does not share a limit. Counted in the database, which
 * all servers share, but a handful at a time: a write for each read would halve the speed of reading.
 */
export function limitCalls(pool: pg.Pool, config: Pick<Config, 'apiCallsPerMinute'>): RequestHandler {
  const step = Math.max(1, Math.floor(config.apiCallsPerMinute / 30));
  const limiter = limiterOf(pool, 'api', config.apiCallsPerMinute);
  // What is left of the calls that this process has already spent in the database: a cache that need not agree.
  const prepaid = new Map<string, { left: number; until: number }>();
  const spending = new Map<string, Promise<void>>();

  const takePrepaid = (key: string): boolean => {
    const known = prepaid.get(key);
    if (known === undefined || known.left === 0 || known.until <= Date.now()) return false;
    known.left -= 1;
    return true;
  };
  const spendAhead = async (key: string): Promise<void> => {
    try {
      await spend(limiter, key, step);
      if (prepaid.size > 10_000) prepaid.clear();
      prepaid.set(key, { left: step, until: Date.now() + minute * 1000 });
    } finally {
      spending.delete(key);
    }
  };
  return async (request, _response, next) => {
    const key = callerOf(request);
    while (!takePrepaid(key)) {
      // A page asks for many things at once: they wait for one handful, each would else take one of its own.
      const taking = spending.get(key) ?? spendAhead(key);
      spending.set(key, taking);
      await taking;
    }
    next();
  };
}

/** Uploads by person: each is work for the database. */
export function limitUploads(pool: pg.Pool, config: Pick<Config, 'uploadsPerMinute'>): RequestHandler {
  const limiter = limiterOf(pool, 'upload', config.uploadsPerMinute);
  return async (request, _response, next) => {
    await spend(limiter, callerOf(request), 1);
    next();
  };
}

function callerOf(request: Request): string {
  const { userId } = request.session;
  return userId === undefined ? `ip ${request.ip ?? 'unknown'}` : `user ${userId}`;
}
