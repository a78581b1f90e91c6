import type { IncomingMessage } from 'node:http';
import type { RequestHandler } from 'express';
import { newId } from '../db/new-id';

const ids = new WeakMap<IncomingMessage, string>();

/** The id of a request: ours, never one that a client sends. */
export function requestIdOf(request: IncomingMessage): string {
  const known = ids.get(request);
  if (known !== undefined) return known;
  const id = newId();
  ids.set(request, id);
  return id;
}

export const requestId: RequestHandler = (request, response, next) => {
  response.set('X-Request-Id', requestIdOf(request));
  next();
};
