import {
  countChanges,
  exportQuerySchema,
  importRequestSchema,
  importResultSchema,
  planImport,
  writeCabinet,
} from '../../../shared/cabinet-document';
import { brokenUnique } from '../../db/sql-state';
import { conflict, refused } from '../../errors';
import { labParams } from '../../http/lab-params';
import { noBody, nothing, type Route, route } from '../../http/route';
import { importPath } from '../../http/uploads';
import { findLab } from '../labs';
import { planHash, readImport, sha256 } from './import-file';
import { lockCabinet, writeImport } from './import-store';
import { readStoredCabinet } from './stored-cabinet';

const mediaTypes = { csv: 'text/csv', json: 'application/json' } as const;

const planChanged = () =>
  conflict(
    'plan-changed',
    'The cabinet has changed since the dry run, so the import would do something else than what was shown. Nothing was imported. Look at what would change now.',
  );

export function exchangeRoutes(): readonly Route[] {
  return [
    route({
      method: 'get',
      path: '/labs/:labId/cabinet/export',
      access: { kind: 'member', action: 'cabinet.read', thing: findLab },
      params: labParams,
      query: exportQuerySchema,
      body: noBody,
      handler: async ({ labId, thing, query: { format }, transaction, now }) => {
        const { document } = await readStoredCabinet(transaction, labId);
        const day = now.toISOString().slice(0, 10);
        return {
          file: {
            name: `${thing.name} cabinet ${day}.${format}`,
            mediaType: mediaTypes[format],
            bytes: Buffer.from(writeCabinet(document, format)),
          },
        };
      },
    }),
    route({
      method: 'post',
      path: importPath,
      access: { kind: 'member', action: 'cabinet.write', thing: findLab },
      params: labParams,
      query: nothing,
      body: importRequestSchema,
      response: importResultSchema,
      handler: async ({ body, labId, user, transaction, audit, now }) => {
        const wanted = readImport(body, now);
        if (!body.dryRun) {
          if (body.planHash === null) {
            throw refused([
              { path: 'planHash', message: 'Do the dry run first, and send the hash that it answers.' },
            ]);
          }
          await lockCabinet(transaction, labId);
        }
        const stored = await readStoredCabinet(transaction, labId);
        const plan = planImport(stored.document, wanted);
        const hash = planHash(plan);
        if (body.dryRun) return { body: { imported: false, plan, planHash: hash }, unchanged: true };
        if (hash !== body.planHash) throw planChanged();
        if (plan.changes.length === 0) {
          return { body: { imported: true, plan, planHash: hash }, unchanged: true };
        }
        try {
          await writeImport(transaction, { labId, userId: user.id, now }, plan, stored);
        } catch (error) {
          // Somebody gave a new thing the same name in the same moment.
          if (brokenUnique(error) === null) throw error;
          throw planChanged();
        }
        await audit({
          kind: 'cabinet.imported',
          subjectId: labId,
          details: {
            format: body.format,
            fileSha256: sha256(body.fileText),
            planHash: hash,
            changes: countChanges(plan),
            refused: plan.refused.length,
          },
        });
        return { body: { imported: true, plan, planHash: hash } };
      },
    }),
  ];
}
