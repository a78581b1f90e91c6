export { requestReliance } from './request-reliance';
