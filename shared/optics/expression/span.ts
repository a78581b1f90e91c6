/** A stretch of the source: from `start` (0-based) up to but without `end`, in UTF-16 units as editors count. */
export interface Span {
  readonly start: number;
  readonly end: number;
}

/** What is wrong, where, and what to write instead. */
export interface ExpressionProblem {
  /** 1-based. */
  readonly column: number;
  readonly length: number;
  /** A whole sentence without the "Column n:" in front. */
  readonly message: string;
  /** Text to put in the marked place. */
  readonly suggestion?: string;
}

/** Thrown inside the expression folder only; `parseState` turns it into a value. */
export class ExpressionError extends Error {
  override readonly name = 'ExpressionError';
  readonly span: Span;
  readonly suggestion: string | undefined;

  constructor(span: Span, message: string, suggestion?: string) {
    super(message);
    this.span = span;
    this.suggestion = suggestion;
  }

  toProblem(): ExpressionProblem {
    const { start, end } = this.span;
    const place = { column: start + 1, length: Math.max(1, end - start), message: this.message };
    return this.suggestion === undefined ? place : { ...place, suggestion: this.suggestion };
  }
}
