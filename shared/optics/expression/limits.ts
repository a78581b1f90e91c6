/** Longest expression, in characters. */
export const MAX_LENGTH = 4096;
/** Deepest nesting of brackets, roots, powers and signs. */
export const MAX_DEPTH = 100;
/** Most numbers, names and operations in one expression. */
export const MAX_NODES = 2000;
