export { type CalibrationAge, calibrationAge } from './calibration-age';
export { platePageQuery, type PlateSearch, plateQuery } from './queries';
export { kindNames, restingAxisDeg } from './plate-words';
