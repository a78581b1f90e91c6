import { calibrationInputSchema, calibrationSchema } from '../../../shared/schemas';
import type { Transaction } from '../../db/database';
import { conflict, refused } from '../../errors';
import { nothing, type Route, route } from '../../http/route';
import { findCalibration, insertCalibration } from './calibration-store';
import type { StoredPlate } from './plate-rows';
import { plateParams } from './plate-routes';
import { findPlateToChange, raiseRevision } from './plate-store';
import { toMilliseconds } from '../../db/to-milliseconds';
import { requireMeasured } from './seat-times';

export function calibrationRoutes(): readonly Route[] {
  return [
    route({
      method: 'post',
      path: '/labs/:labId/plates/:plateId/calibrations',
      access: { kind: 'member', action: 'calibrations.record', thing: findPlateToChange },
      params: plateParams,
      query: nothing,
      body: calibrationInputSchema,
      response: calibrationSchema,
      idempotent: true,
      handler: async ({ body, thing, labId, user, transaction, audit, now }) => {
        const seat = seatToCalibrate(thing);
        requireMeasured(thing, seat, { at: body.measuredAt, now, path: 'measuredAt' });
        await requireSettles(transaction, thing, body.settlesId);
        const id = await insertCalibration(transaction, { labId, userId: user.id, now }, seat.id, body);
        await raiseRevision(transaction, thing);
        await audit({
          kind: 'plate.calibrated',
          subjectId: thing.id,
          details: { calibrationId: id, calibration: body },
        });
        return {
          status: 201,
          body: {
            ...body,
            id,
            fileId: null,
            measuredAt: toMilliseconds(body.measuredAt),
            recordedBy: user.name,
          },
        };
      },
    }),
  ];
}

/** @throws ProblemError 409 where a measurement would hold for nothing. */
export function seatToCalibrate(plate: StoredPlate): NonNullable<StoredPlate['seat']> {
  if (plate.retiredAt !== null) {
    throw conflict(
      'plate-retired',
      `${plate.name} is retired. Return it to the cabinet before it is calibrated.`,
    );
  }
  if (plate.seat === null) {
    throw conflict(
      'not-seated',
      `${plate.name} sits in no mount, so a zero would hold for nothing. Seat it before it is calibrated.`,
    );
  }
  return plate.seat;
}

/** What is settled is an open question of this plate in its present seat: of another seat nothing is used any more. */
export async function requireSettles(
  transaction: Transaction,
  plate: StoredPlate,
  settlesId: string | null,
): Promise<void> {
  if (settlesId === null) return;
  const key = { labId: plate.labId, plateId: plate.id, calibrationId: settlesId };
  const settled = await findCalibration(transaction, key);
  const path = 'settlesId';
  if (settled === null || settled.seatId !== plate.seat?.id) {
    throw refused([
      {
        path,
        message: `${plate.name} has no such calibration in its present seat. Open the plate again and choose.`,
      },
    ]);
  }
  if (settled.calibration.openQuestions.length === 0) {
    throw refused([{ path, message: 'That calibration left nothing open.' }]);
  }
}
