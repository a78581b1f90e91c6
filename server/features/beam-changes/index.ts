export { isNewestVersion } from './newest-version';
export { requestReliance } from './request-reliance';
