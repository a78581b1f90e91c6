import {
  calibrationDetailSchema,
  calibrationSchema,
  idSchema,
  recordScanSchema,
  rememberedColumnsSchema,
  scanColumnsQuerySchema,
  scanRecordSchema,
} from '../../../shared/schemas';
import type { Transaction } from '../../db/database';
import { conflict } from '../../errors';
import { labParams } from '../../http/lab-params';
import { noBody, nothing, type Route, route } from '../../http/route';
import { findFile } from '../files';
import { findLab } from '../labs';
import { requireSettles, seatToCalibrate } from './calibration-routes';
import { findCalibration, insertCalibration } from './calibration-store';
import { plateParams } from './plate-routes';
import { findPlateToChange, raiseRevision } from './plate-store';
import { toMilliseconds } from '../../db/to-milliseconds';
import { requireMeasured } from './seat-times';
import { rememberColumns, rememberedColumns } from './scan-store';
import { calibrationOfScan, readScan } from './scan-work';

const calibrationParams = plateParams.extend({ calibrationId: idSchema });

async function findCalibrationThing(
  transaction: Transaction,
  key: { readonly labId: string; readonly plateId: string; readonly calibrationId: string },
) {
  const found = await findCalibration(transaction, key);
  return found === null ? null : { ...found, labId: key.labId };
}

export function scanRoutes(): readonly Route[] {
  return [
    route({
      method: 'get',
      path: '/labs/:labId/scan-columns',
      access: { kind: 'member', action: 'cabinet.read', thing: findLab },
      params: labParams,
      query: scanColumnsQuerySchema,
      body: noBody,
      response: rememberedColumnsSchema,
      handler: async ({ query, labId, transaction }) => ({
        body: { columns: await rememberedColumns(transaction, labId, query.signature) },
      }),
    }),
    route({
      method: 'get',
      path: '/labs/:labId/plates/:plateId/calibrations/:calibrationId',
      access: { kind: 'member', action: 'cabinet.read', thing: findCalibrationThing },
      params: calibrationParams,
      query: nothing,
      body: noBody,
      response: calibrationDetailSchema,
      handler: async ({ thing, labId, transaction }) => {
        const { calibration, fit } = thing;
        const file =
          calibration.fileId === null
            ? null
            : await findFile(transaction, { labId, fileId: calibration.fileId });
        if (fit === null || file === null) return { body: { calibration, scan: null } };
        const { labId: _labId, ...shown } = file;
        return {
          body: { calibration, scan: { record: scanRecordSchema.parse(JSON.parse(fit)), file: shown } },
        };
      },
    }),
    route({
      method: 'post',
      path: '/labs/:labId/plates/:plateId/scans',
      access: { kind: 'member', action: 'calibrations.record', thing: findPlateToChange },
      params: plateParams,
      query: nothing,
      body: recordScanSchema,
      response: calibrationSchema,
      idempotent: true,
      handler: async ({ body, thing, labId, transaction, now }) => {
        const seat = seatToCalibrate(thing);
        requireMeasured(thing, seat, { at: body.measuredAt, now, path: 'measuredAt' });
        await requireSettles(transaction, thing, body.settlesId);
        const lab = await findLab(transaction, { labId });
        if (lab === null) throw new Error('the lab of a plate is there by foreign key');
        const read = await readScan(transaction, lab, { ...thing, seat }, body);
        return {
          outside: () => {
            const { calibration, record, signature } = calibrationOfScan(read, body);
            return Promise.resolve(async (last) => {
              if (last.thing.seat?.id !== seat.id || last.thing.revision !== thing.revision) {
                throw conflict(
                  'changed-meanwhile',
                  `${thing.name} was changed while the scan was fitted. Look at it, then record the scan again if it still holds.`,
                );
              }
              const place = { labId, userId: last.user.id, now: last.now };
              const scan = { fileId: body.fileId, fit: record };
              const id = await insertCalibration(last.transaction, place, seat.id, calibration, scan);
              await rememberColumns(last.transaction, place, signature, body.columns);
              await raiseRevision(last.transaction, last.thing);
              await last.audit({
                kind: 'plate.scanned',
                subjectId: thing.id,
                details: { calibrationId: id, calibration, fileId: body.fileId, leftOut: body.leftOut },
              });
              return {
                status: 201,
                body: {
                  ...calibration,
                  id,
                  fileId: body.fileId,
                  measuredAt: toMilliseconds(calibration.measuredAt),
                  recordedBy: last.user.name,
                },
              };
            });
          },
        };
      },
    }),
  ];
}
