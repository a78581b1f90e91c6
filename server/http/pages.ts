import { existsSync } from 'node:fs';
import path from 'node:path';
import express, { type RequestHandler, Router } from 'express';
import { notFound, ProblemError } from '../errors';

const year = 31_536_000;
const encodings = [
  { name: 'br', ending: '.br' },
  { name: 'gzip', ending: '.gz' },
] as const;

/**
 * The built client. Names under /assets hold a hash and are kept for ever; everything else is asked for anew.
 * Any other page address is the client's own to show, and a file that is missing is missing: never the page in its place.
 */
export function pages(directory: string): Router {
  const router = Router();
  const assets = path.join(directory, 'assets');
  router.use('/assets', (request, response, next) => {
    response.set('Cache-Control', `public, max-age=${year}, immutable`);
    precompressed(assets)(request, response, next);
  });
  router.use(
    '/assets',
    express.static(assets, { index: false, redirect: false, dotfiles: 'ignore', cacheControl: false }),
  );
  router.use('/assets', (_request, response, next) => {
    response.removeHeader('Cache-Control');
    next(notFound());
  });
  router.use(
    express.static(directory, {
      index: false,
      redirect: false,
      dotfiles: 'ignore',
      cacheControl: false,
      setHeaders: (response) => void response.setHeader('Cache-Control', 'no-cache'),
    }),
  );
  router.use(page(directory));
  return router;
}

/** A file compressed at build time, where the browser takes it. */
function precompressed(directory: string): RequestHandler {
  return (request, response, next) => {
    const name = request.path.slice(1);
    if (request.method !== 'GET' || !/^[\w-]+(?:\.[\w-]+)+$/.test(name)) {
      next();
      return;
    }
    response.vary('Accept-Encoding');
    const accepted = encodings.find(
      (encoding) =>
        request.acceptsEncodings(encoding.name) === encoding.name &&
        existsSync(path.join(directory, name + encoding.ending)),
    );
    if (accepted !== undefined) {
      response.type(path.extname(name));
      response.set('Content-Encoding', accepted.name);
      request.url = `/${name}${accepted.ending}`;
    }
    next();
  };
}

function page(directory: string): RequestHandler {
  return (request, response, next) => {
    const looksLikeFile =
      /\.[\w-]+$/.test(request.path) || request.path.split('/').some((part) => part.startsWith('.'));
    if (
      (request.method !== 'GET' && request.method !== 'HEAD') ||
      looksLikeFile ||
      request.accepts('html') === false
    ) {
      next(notFound());
      return;
    }
    response.set('Cache-Control', 'no-cache');
    response.sendFile('index.html', { root: directory, cacheControl: false }, (error?: Error) => {
      if (error === undefined || response.headersSent) return;
      next(new ProblemError('not-built', 503, 'The pages are not built yet. Run: npm run build'));
    });
  };
}
