export { listRuns, type RunRow } from './run-store';
export { startRun, recordReading, changeState } from './run-work';
export { runRoutes } from './routes';
