export { ReliesOnPlate } from './ReliesOnPlate';
export { voidReasons } from './void-reasons';
