export { findPlate, insertCalibration, insertPlate, listPlates, asPlate } from './plate-store';
export { plateRoutes } from './routes';
