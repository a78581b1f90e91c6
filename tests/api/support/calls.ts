import { randomUUID } from 'node:crypto';
import type supertest from 'supertest';
import type { z } from 'zod';
import type { Agent, Harness } from './harness';

type Method = 'get' | 'post' | 'put' | 'patch' | 'delete';

interface CallOptions {
  readonly body?: unknown;
  readonly ifMatch?: string;
  /** A fresh one unless given; null sends none. */
  readonly key?: string | null;
}

/** One call of the API as our own page makes it: same origin, JSON, a key for what creates. */
export function call(
  harness: Pick<Harness, 'origin'>,
  agent: Agent,
  method: Method,
  path: string,
  options: CallOptions = {},
): supertest.Test {
  let request = agent[method](`/api/v1${path}`).set('Origin', harness.origin);
  if (method === 'post' && options.key !== null)
    request = request.set('Idempotency-Key', options.key ?? randomUUID());
  if (options.ifMatch !== undefined) request = request.set('If-Match', options.ifMatch);
  if (options.body === undefined) return request;
  return request.set('Content-Type', 'application/json').send(JSON.stringify(options.body));
}

/** A file sent as our own page sends it: its bytes as they are, under a name. */
export function upload(
  harness: Pick<Harness, 'origin'>,
  agent: Agent,
  path: string,
  content: string | Buffer,
  name = 'scan.csv',
): supertest.Test {
  return agent
    .post(`/api/v1${path}?name=${encodeURIComponent(name)}`)
    .set('Origin', harness.origin)
    .set('Idempotency-Key', randomUUID())
    .set('Content-Type', 'application/octet-stream')
    .send(content);
}

/** The answer's body, read by its schema; anything but success fails with what the server said. */
export async function answered<S extends z.ZodType>(
  request: supertest.Test,
  schema: S,
): Promise<z.output<S>> {
  const response = await request;
  if (response.status >= 300) {
    throw new Error(`${request.method} ${request.url} answered ${response.status}: ${response.text}`);
  }
  return schema.parse(response.body);
}
