export { isNewestVersion } from './newest-version';
export { requestReliance } from './request-reliance';
export { unseatedPlateIds } from './unseated-plates';
