export { ReliesOnPlate } from './ReliesOnPlate';
