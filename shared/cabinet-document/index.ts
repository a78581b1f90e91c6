export {
  type CabinetDocument,
  cabinetDocumentSchema,
  cabinetFormat,
  calibrationsOf,
  type DocumentCalibration,
  type DocumentMount,
  type DocumentPlate,
  type DocumentPlateHead,
  type DocumentRef,
  type DocumentSeat,
  emptyDocument,
  refKey,
} from './document';
export { inOrder } from './document-order';
export { type FileFault, maxFaults } from './faults';
export { type CabinetFileFormat, cabinetFileFormats, readCabinet, writeCabinet } from './read-document';
export {
  type FieldChange,
  type FieldValue,
  type ImportChange,
  type ImportPlan,
  importPlanSchema,
  type ImportRefusal,
} from './import-plan';
export { planImport } from './plan-import';
export {
  exportQuerySchema,
  type ImportRequest,
  importRequestSchema,
  type ImportResult,
  importResultSchema,
} from './exchange';
export { countChanges } from './count-changes';
export { maxDocumentBytes, maxDocumentRows } from './limits';
