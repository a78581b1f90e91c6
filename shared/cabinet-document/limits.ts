/** The most rows that a file may have: one a calibration, a seat without one, a plate without a seat, an empty mount. */
export const maxDocumentRows = 10_000;
/** The most that a file may be, in bytes as UTF-8. */
export const maxDocumentBytes = 4 * 1024 * 1024;
