import { type Request, type RequestHandler, type Response, Router } from 'express';
import type { Knex } from 'knex';
import passport from 'passport';
import type { Logger } from 'pino';
import { z } from 'zod';
import { recordAccountEvent } from '../../audit/record-account-event';
import type { Config } from '../../config';
import { requestIdOf } from '../../http/request-id';
import { GitHubStrategy } from './github';
import { knowPerson } from './people';
import { returnTo } from './return-to';
import { regenerateSession, saveSession } from './session';

/** What the sign-in page can be told; never a provider's own words. */
type SignInProblem = 'declined' | 'stale' | 'provider' | 'too-many' | 'disabled' | 'failed';

const personSchema = z.object({
  subject: z.string(),
  login: z.string(),
  name: z.string(),
  email: z.string().nullable(),
});
const infoSchema = z.object({ state: z.object({ returnTo: z.string() }) });

export function toSignIn(response: Response, problem: SignInProblem): void {
  response.redirect(303, `/sign-in?problem=${problem}`);
}

/** Sends a browser to the provider and takes it back. */
export function signInRoutes(config: Config, database: Knex, logger: Logger): Router {
  // By name and never as an instance: passport clones a named strategy for each request, and hangs the answers of two
  // requests at once on one instance.
  const authenticator = new passport.Passport();
  authenticator.use('github', new GitHubStrategy(config));
  const router = Router();
  router.get('/auth/github', onOwnHost(config.publicOrigin), (request, response, next) => {
    const start = asHandler(authenticator.authenticate('github', { session: false }));
    start(request, response, next);
  });

  router.get('/auth/github/callback', async (request, response, next) => {
    const fail = async (problem: SignInProblem) => {
      await recordAccountEvent(database, {
        kind: 'sign-in-failed',
        userId: null,
        detail: problem,
        requestId: requestIdOf(request),
      });
      toSignIn(response, problem);
    };
    // Without a code there is nothing to verify: passport would print what the provider says, or start a new sign-in.
    if (typeof request.query['code'] !== 'string' || request.query['error'] !== undefined) {
      await fail(request.query['error'] === 'access_denied' ? 'declined' : 'stale');
      return;
    }
    const outcome = await askProvider(authenticator, request, response, next);
    if (outcome.kind === 'refused') return fail('stale');
    if (outcome.kind === 'broken') {
      logger.warn(
        { reason: outcome.reason, requestId: requestIdOf(request) },
        'a sign-in failed at the provider',
      );
      return fail('provider');
    }
    const person = personSchema.safeParse(outcome.person);
    if (!person.success) return fail('provider');
    const known = await knowPerson(database, person.data);
    if (known.disabled) return fail('disabled');
    // Read before the new session: nothing else of the old one is taken over.
    const info = infoSchema.safeParse(outcome.info);
    const target = returnTo(info.success ? info.data.state.returnTo : '/');
    await regenerateSession(request);
    request.session.userId = known.userId;
    request.session.epoch = known.epoch;
    request.session.signedInAt = Date.now();
    await saveSession(request);
    await recordAccountEvent(database, {
      kind: 'signed-in',
      userId: known.userId,
      detail: 'github',
      requestId: requestIdOf(request),
    });
    response.redirect(303, target);
  });
  return router;
}

/** Passport's types say nothing of what it makes. */
function asHandler(made: unknown): RequestHandler {
  if (!isHandler(made)) throw new TypeError('passport made no handler');
  return made;
}

function isHandler(made: unknown): made is RequestHandler {
  return typeof made === 'function';
}

type Outcome =
  | { readonly kind: 'known'; readonly person: unknown; readonly info: unknown }
  | { readonly kind: 'refused' }
  | { readonly kind: 'broken'; readonly reason: string };

function askProvider(
  authenticator: InstanceType<typeof passport.Passport>,
  request: Request,
  response: Response,
  next: (error?: unknown) => void,
): Promise<Outcome> {
  return new Promise((resolve) => {
    const finish = asHandler(
      authenticator.authenticate(
        'github',
        { session: false },
        (error: unknown, person: unknown, info: unknown) => {
          if (error !== null && error !== undefined) {
            resolve({ kind: 'broken', reason: error instanceof Error ? error.message : 'unknown' });
          } else if (person === false || person === undefined || person === null)
            resolve({ kind: 'refused' });
          else resolve({ kind: 'known', person, info });
        },
      ),
    );
    finish(request, response, next);
  });
}

/** A browser that opened us by another name would lose its cookie on the way back: begin again under our own. */
function onOwnHost(publicOrigin: string): RequestHandler {
  const { host } = new URL(publicOrigin);
  return (request, response, next) => {
    if (request.get('Host') === host) {
      next();
      return;
    }
    const own = new URL('/auth/github', publicOrigin);
    own.searchParams.set('returnTo', returnTo(request.query['returnTo']));
    if (request.query['again'] === undefined) {
      own.searchParams.set('again', '1');
      response.redirect(303, own.href);
    } else next();
  };
}
