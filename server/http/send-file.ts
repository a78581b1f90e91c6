import type { Response } from 'express';
import type { SentFile } from './route';

/**
 * Sends what somebody uploaded, or a lab exports: to be saved and never to be shown by itself, so that nothing in it runs as a page of ours.
 * A picture can still be drawn in a page, since an image has no such rights.
 */
export function sendFile(response: Response, { name, mediaType, bytes }: SentFile): void {
  const ascii = name.replaceAll(/[^\w. -]/g, '_');
  response.set({
    'Content-Type': mediaType.startsWith('text/') ? `${mediaType}; charset=utf-8` : mediaType,
    // RFC 6266: the plain name for old clients, the real one for all others.
    'Content-Disposition': `attachment; filename="${ascii}"; filename*=UTF-8''${encodeURIComponent(name)}`,
    'Content-Security-Policy': "sandbox; default-src 'none'",
  });
  response.send(bytes);
}
