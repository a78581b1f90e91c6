import { MAX_DEPTH, MAX_NODES } from './limits';
import { ExpressionError, type Span } from './span';
import type { Symbol, Token } from './tokens';
import type { Node } from './tree';

/** A place in the tokens, with what every rule of the grammar asks of it and the limits of depth and size. */
export class Cursor {
  protected at = 0;
  private depth = 0;
  private nodes = 0;

  constructor(
    protected readonly tokens: readonly Token[],
    protected readonly length: number,
  ) {}

  protected close(symbol: ')' | ']', open: Span): number {
    const token = this.tokens[this.at];
    if (token?.kind === 'symbol' && token.symbol === symbol) {
      this.at += 1;
      return token.span.end;
    }
    if (token === undefined) throw new ExpressionError(open, `This bracket is not closed. Add ${symbol}.`);
    throw new ExpressionError(
      token.span,
      `Something else stands where ${symbol} should close the bracket at column ${open.start + 1}.`,
    );
  }

  protected open(symbol: '[', span: Span, form: string): void {
    if (!this.isSymbol(symbol)) throw new ExpressionError(this.tokens[this.at]?.span ?? span, form);
    this.at += 1;
  }

  protected takeSign(): boolean | null {
    const negative = this.isSymbol('-');
    if (!negative && !this.isSymbol('+')) return null;
    this.at += 1;
    return negative;
  }

  protected isSymbol(symbol: Symbol): boolean {
    const token = this.tokens[this.at];
    return token?.kind === 'symbol' && token.symbol === symbol;
  }

  protected here(): Span {
    return this.tokens[this.at]?.span ?? { start: this.length, end: this.length + 1 };
  }

  protected endsEarly(): ExpressionError {
    const last = this.tokens[this.tokens.length - 1];
    const span = last?.span ?? { start: 0, end: 1 };
    return new ExpressionError(span, 'The expression ends here before it is complete. Write what follows.');
  }

  /** Whether a dagger stands here that belongs to what is before it: "S dagger(T)" is S times the dagger of T. */
  protected isDagger(): boolean {
    const token = this.tokens[this.at];
    if (token?.kind !== 'word') return false;
    if (token.name === '†') return true;
    if (token.name !== 'dagger') return false;
    const next = this.tokens[this.at + 1];
    if (next?.kind !== 'symbol' || next.symbol !== '(') return true;
    if (next.span.start === token.span.end) return false;
    throw new ExpressionError(
      token.span,
      'Is this the dagger of what is before it or behind it? Write S† (T), or dagger(T) without a space.',
      '†',
    );
  }

  protected enter(): void {
    this.depth += 1;
    // A bracket costs two levels of ours, its sum and its power; the limit counts what a person nests.
    if (this.depth > 2 * MAX_DEPTH) {
      throw new ExpressionError(this.here(), `This is nested deeper than ${MAX_DEPTH} levels.`);
    }
  }

  protected leave(): void {
    this.depth -= 1;
  }

  protected made<T extends Node>(node: T): T {
    this.nodes += 1;
    if (this.nodes > MAX_NODES) {
      throw new ExpressionError(node.span, `This has more than ${MAX_NODES} numbers, names and operations.`);
    }
    return node;
  }
}
