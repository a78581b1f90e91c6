import { z } from 'zod';
import { fileNameQuerySchema, fileSchema, idSchema, maxPersonBytes } from '../../../shared/schemas';
import { ProblemError, refused } from '../../errors';
import { labParams } from '../../http/lab-params';
import { noBody, nothing, type Route, route } from '../../http/route';
import { findLab } from '../labs';
import { findFile, insertFile, readBytes, storedBytes } from './file-store';
import { recognise } from './media-type';

const fileParams = labParams.extend({ fileId: idSchema });
const bytesSchema = z.instanceof(Buffer, {
  error: 'Send the file itself as the body, as application/octet-stream.',
});

/** A label is shown and written into a header: no path, no control character. */
function labelOf(name: string): string {
  const last = name.replaceAll(/\p{C}/gu, '').split(/[/\\]/).at(-1)?.trim() ?? '';
  return last === '' ? 'file' : last;
}

export function fileRoutes(): readonly Route[] {
  return [
    route({
      method: 'post',
      path: '/labs/:labId/files',
      access: { kind: 'member', action: 'files.upload', thing: findLab },
      params: labParams,
      query: fileNameQuerySchema,
      body: bytesSchema,
      response: fileSchema,
      idempotent: true,
      handler: async ({ body, query, labId, user, transaction, audit, now }) => {
        const name = labelOf(query.name);
        if (body.length === 0) {
          throw refused([{ path: '', message: `${name} is empty. Choose the file again.` }]);
        }
        const recognised = await recognise(body);
        if (!recognised.ok) {
          throw refused([
            {
              path: '',
              message: `${name} is ${recognised.what}. Send plain text such as CSV, a PNG, JPEG or WebP picture, or a PDF.`,
            },
          ]);
        }
        const stored = await storedBytes(transaction, { labId, userId: user.id });
        if (stored + body.length > maxPersonBytes) {
          throw new ProblemError(
            'quota-spent',
            413,
            `Your files in this lab come to ${Math.round(stored / 1e6)} MB, and ${maxPersonBytes / 1024 / 1024} MB is the most. Nothing was stored.`,
          );
        }
        const place = { labId, userId: user.id, now };
        const fileId = await insertFile(transaction, place, {
          name,
          mediaType: recognised.mediaType,
          bytes: body,
        });
        const file = await findFile(transaction, { labId, fileId });
        if (file === null) throw new Error('a file that was just stored is not there');
        const { labId: _labId, ...shown } = file;
        await audit({ kind: 'file.uploaded', subjectId: fileId, details: { file: shown } });
        return { status: 201, body: shown };
      },
    }),
    route({
      method: 'get',
      path: '/labs/:labId/files/:fileId',
      access: { kind: 'member', action: 'cabinet.read', thing: findFile },
      params: fileParams,
      query: nothing,
      body: noBody,
      handler: async ({ thing, labId, transaction }) => ({
        file: {
          name: thing.name,
          mediaType: thing.mediaType,
          bytes: await readBytes(transaction, { labId, fileId: thing.id }),
        },
      }),
    }),
  ];
}
