/** A stretch of the source: from `start` (0-based) up to but without `end`, in UTF-16 units as editors count. */
export interface Span {
  readonly start: number;
  readonly end: number;
}

/** From the first to the last of what stands in a row. */
export function around(parts: readonly { readonly span: Span }[]): Span {
  return { start: parts[0]?.span.start ?? 0, end: parts.at(-1)?.span.end ?? 1 };
}

/** How far a matrix is from the nearest unitary (Frobenius norm, both brought to one scale), and that unitary as text. */
export interface FromUnitary {
  readonly distanceFromUnitary: number;
  readonly nearestUnitary: string;
}

/** What is wrong, where, and what to write instead. */
export interface ExpressionProblem extends Partial<FromUnitary> {
  /** 1-based. */
  readonly column: number;
  readonly length: number;
  /** A whole sentence without the "Column n:" in front. */
  readonly message: string;
  /** Text to put in the marked place. */
  readonly suggestion?: string;
}

/** Thrown inside the expression folder only; `parseState` and its like turn it into a value. */
export class ExpressionError extends Error {
  override readonly name = 'ExpressionError';
  readonly span: Span;
  readonly suggestion: string | undefined;
  readonly fromUnitary: FromUnitary | undefined;

  constructor(span: Span, message: string, suggestion?: string, fromUnitary?: FromUnitary) {
    super(message);
    this.span = span;
    this.suggestion = suggestion;
    this.fromUnitary = fromUnitary;
  }

  toProblem(): ExpressionProblem {
    const { start, end } = this.span;
    const place = { column: start + 1, length: Math.max(1, end - start), message: this.message };
    return {
      ...place,
      ...(this.suggestion === undefined ? {} : { suggestion: this.suggestion }),
      ...this.fromUnitary,
    };
  }
}
