import type { RequestHandler } from 'express';
import { ProblemError } from '../errors';
import { isUpload } from './uploads';

const safeMethods = new Set(['GET', 'HEAD', 'OPTIONS']);

/**
 * Refuses a write that another site, or another port of this host, made a browser send with our cookie
 * (Fetch Metadata, w3.org/TR/fetch-metadata; plain http sends no Sec-Fetch-Site, so an exact Origin decides there).
 * A write with a body is JSON, or the bytes of a file, neither of which a form can send.
 */
export function refuseCrossSite(publicOrigin: string): RequestHandler {
  return (request, _response, next) => {
    if (safeMethods.has(request.method)) {
      next();
      return;
    }
    const site = request.get('Sec-Fetch-Site');
    const own = site === undefined ? request.get('Origin') === publicOrigin : site === 'same-origin';
    if (!own) {
      next(
        new ProblemError(
          'cross-site',
          403,
          'This change was asked for by a page that is not ours. Nothing was changed.',
        ),
      );
      return;
    }
    const hasBody =
      request.get('Transfer-Encoding') !== undefined || Number(request.get('Content-Length') ?? '0') > 0;
    const [type, words] = isUpload(request.method, request.path)
      ? ['application/octet-stream', 'the file itself']
      : ['application/json', 'JSON'];
    if (hasBody && request.is(type) === false) {
      next(new ProblemError('unsupported', 415, `The body of the request is ${words}: send it as ${type}.`));
      return;
    }
    next();
  };
}
