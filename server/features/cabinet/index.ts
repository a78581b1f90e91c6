export {
  findPlate,
  insertCalibration,
  insertPlate,
  listPlates,
  asPlate,
  type StoredPlate,
} from './plate-store';
export { plateRoutes } from './routes';
