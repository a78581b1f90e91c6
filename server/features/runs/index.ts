export { findRun, listRuns, type RunRow } from './run-store';
export { readingEntry, startedEntry, stateEntry } from './run-record';
export { changeState, recordReading, startRun, type StateChange } from './run-work';
export { runRoutes } from './routes';
