export { findBench, insertBench, listBenches, type StoredBench } from './bench-store';
export { benchRoutes } from './routes';
