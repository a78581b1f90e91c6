export { type CalibrationAge, calibrationAge } from './calibration-age';
export { platesQuery } from './queries';
export { kindNames, restingAxisDeg } from './plate-words';
