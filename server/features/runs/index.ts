export { findRun, listRuns, type RunRow } from './run-store';
export { changeState, recordReading, startRun } from './run-work';
export { runRoutes } from './routes';
