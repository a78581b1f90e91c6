export { isoFromLocalField, isoFromOptionalField, localFieldFromDate } from './local-time';
export { halfTypedSentence, schemaResolver } from './schema-resolver';
export { readOptionalNumber, readTypedNumber, typedFromNumber, typedFromOptional } from './typed-number';
export { useIdempotencyKey } from './use-idempotency-key';
export { conflictingState, problemSentences } from './form-problem';
export { LeaveAsItWas, LeaveForm } from './LeaveForm';
export { FormProblem } from './FormProblem';
export { EditConflict, type EditDifference } from './EditConflict';
export { serverFaultAt, showServerFaults } from './server-faults';
