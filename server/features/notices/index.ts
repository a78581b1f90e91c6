export { lookWorkers } from './look-workers';
export { tellWhatIsDue } from './tell-due';
export { tellWhoLeftTolerance } from './tell-left';
