import type { CabinetPlate } from '../../../../shared/schemas/cabinet';
import type { SeatPlate, TakeOut } from '../../../../shared/schemas/mounts';
import { request } from '../../../lib/api';

/** Puts a plate into a mount; the seat it had ends. */
export function seatPlate(labId: string, plate: Pick<CabinetPlate, 'id' | 'revision'>, body: SeatPlate) {
  return request<CabinetPlate>(`/labs/${labId}/plates/${plate.id}/seat`, {
    method: 'PUT',
    body,
    ifMatch: plate.revision,
  });
}

export function takePlateOut(labId: string, plate: Pick<CabinetPlate, 'id' | 'revision'>, body: TakeOut) {
  return request<CabinetPlate>(`/labs/${labId}/plates/${plate.id}/take-out`, {
    method: 'POST',
    body,
    ifMatch: plate.revision,
  });
}
