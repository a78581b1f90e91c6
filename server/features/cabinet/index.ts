import type { Route } from '../../http/route';
import { attachedFileRoutes } from './attached-file-routes';
import { calibrationRoutes } from './calibration-routes';
import { mountRoutes } from './mount-routes';
import { plateRoutes } from './plate-routes';
import { scanRoutes } from './scan-routes';
import { seatRoutes } from './seat-routes';

export { insertCalibration, measuredColumns } from './calibration-store';
export { mountColumns } from './mount-store';
export {
  asCabinetPlate,
  asReadyPlate,
  calibrationColumns,
  calibrationRow,
  mapCalibration,
  mapMountColumns,
  mapPlateColumns,
  mountColumnsRow,
  plateColumnsRow,
  type StoredPlate,
} from './plate-rows';
export { findPlate, findPlates, findPlatesAtHand, findPlatesInBeams, plateColumns } from './plate-store';
export { addPlate, seatPlate, takeOutPlate } from './plate-work';
export { rememberColumns } from './scan-store';
export { calibrationOfScan, readScan } from './scan-work';

export function cabinetRoutes(): readonly Route[] {
  return [
    ...plateRoutes(),
    ...seatRoutes(),
    ...calibrationRoutes(),
    ...scanRoutes(),
    ...attachedFileRoutes(),
    ...mountRoutes(),
  ];
}
