export { relianceWorker } from './reliance-worker';
export { type StaleVersion, staleVersions } from './reliant-versions';
export { relianceRoutes } from './routes';
