export { betweenTurns } from './between-turns';
export { queueJob, queueJobs } from './queue-job';
export { type JobKind, jobData } from './queues';
export { type Jobs, startJobs } from './start-jobs';
export { type Worker, worker } from './work-loop';
