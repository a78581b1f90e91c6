export { type CalibrationAge, calibrationAge } from './calibration-age';
export { platesQuery } from './queries';
export { restingAxisDeg } from './plate-words';
