import { attachFileSchema, idSchema, plateDetailSchema } from '../../../shared/schemas';
import { notFound, refused } from '../../errors';
import { noBody, nothing, type Route, route } from '../../http/route';
import { findFile } from '../files';
import { attachFile, detachFile, listAttachedFiles } from './attached-files';
import { plateParams } from './plate-routes';
import { findPlateToChange } from './plate-store';

const attachedParams = plateParams.extend({ fileId: idSchema });
const filesSchema = plateDetailSchema.pick({ files: true });

/** A photo is a picture; a data sheet may be one too. */
const fits = {
  photo: ['image/png', 'image/jpeg', 'image/webp'],
  'data-sheet': ['application/pdf', 'text/plain', 'image/png', 'image/jpeg', 'image/webp'],
} as const;

export function attachedFileRoutes(): readonly Route[] {
  return [
    route({
      method: 'post',
      path: '/labs/:labId/plates/:plateId/files',
      access: { kind: 'member', action: 'cabinet.write', thing: findPlateToChange },
      params: plateParams,
      query: nothing,
      body: attachFileSchema,
      response: filesSchema,
      idempotent: true,
      handler: async ({ body, thing, labId, transaction, audit, now }) => {
        const file = await findFile(transaction, { labId, fileId: body.fileId });
        if (file === null) {
          throw refused([{ path: 'fileId', message: 'There is no such file in this lab. Upload it first.' }]);
        }
        if (!fits[body.kind].some((mediaType) => mediaType === file.mediaType)) {
          throw refused([
            { path: 'kind', message: `${file.name} is no picture. Attach it as a data sheet.` },
          ]);
        }
        const key = { labId, plateId: thing.id };
        await attachFile(transaction, key, body, now);
        await audit({
          kind: 'plate.file-attached',
          subjectId: thing.id,
          details: { fileId: file.id, name: file.name, kind: body.kind, sha256: file.sha256 },
        });
        return { status: 201, body: { files: await listAttachedFiles(transaction, key) } };
      },
    }),
    route({
      method: 'delete',
      path: '/labs/:labId/plates/:plateId/files/:fileId',
      access: { kind: 'member', action: 'cabinet.write', thing: findPlateToChange },
      params: attachedParams,
      query: nothing,
      body: noBody,
      handler: async ({ params, thing, labId, transaction, audit, now }) => {
        const attached = await detachFile(transaction, { labId, plateId: thing.id }, params.fileId, now);
        if (!attached) throw notFound();
        await audit({
          kind: 'plate.file-taken-off',
          subjectId: thing.id,
          details: { fileId: params.fileId },
        });
        return {};
      },
    }),
  ];
}
