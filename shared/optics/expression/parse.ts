import { MAX_DEPTH, MAX_LENGTH, MAX_NODES } from './limits';
import { ExpressionError, type Span } from './span';
import { type Symbol, type Token, tokenise } from './tokens';
import type { Factor, FunctionName, Node, Term } from './tree';

/** How many arguments each function takes, and how a call of it is written. */
const SIGNATURES: Readonly<Record<FunctionName, { readonly count: number; readonly form: string }>> = {
  sqrt: { count: 1, form: 'sqrt(2)' },
  exp: { count: 1, form: 'exp(i 45deg)' },
  cos: { count: 1, form: 'cos(22.5deg)' },
  sin: { count: 1, form: 'sin(22.5deg)' },
  linear: { count: 1, form: 'linear(22.5deg)' },
  bloch: { count: 2, form: 'bloch(90deg, 45deg)' },
  ellipse: { count: 2, form: 'ellipse(20deg, 10deg)' },
  stokes: { count: 3, form: 'stokes(0.6, 0, 0.8)' },
};

/**
 * The typed tree of a source, by recursive descent in one pass.
 *
 *     sum     = [sign] product { sign product }
 *     product = power { ("*" | "/" | nothing) power }      left to right: 1/2 i is i/2
 *     power   = sign power | primary [ "^" power ]
 *     primary = number | constant | unit | state | ket | "√" primary | function "(" sum {"," sum} ")"
 *             | "(" sum ")" | "[" sum "," sum "]"
 *
 * @throws ExpressionError with the place of the first thing that doesn't fit, and at the limits of limits.ts.
 */
export function parse(source: string): Node {
  if (source.length > MAX_LENGTH) {
    throw new ExpressionError(
      { start: MAX_LENGTH, end: source.length },
      `This is ${source.length} characters long. Expressions end at ${MAX_LENGTH}.`,
    );
  }
  const parser = new Parser(tokenise(source), source.length);
  return parser.whole();
}

class Parser {
  private at = 0;
  private depth = 0;
  private nodes = 0;

  constructor(
    private readonly tokens: readonly Token[],
    private readonly length: number,
  ) {}

  whole(): Node {
    if (this.tokens.length === 0) {
      throw new ExpressionError(
        { start: 0, end: 1 },
        'Nothing is written here. Write a state, such as H or (H + i V)/sqrt(2).',
      );
    }
    const node = this.sum();
    const rest = this.tokens[this.at];
    if (rest === undefined) return node;
    if (rest.kind === 'symbol' && (rest.symbol === ')' || rest.symbol === ']')) {
      throw new ExpressionError(
        rest.span,
        `This ${rest.symbol} closes nothing. Remove it, or open it further left.`,
      );
    }
    throw new ExpressionError(
      rest.span,
      'A comma stands only between the parts of a column or of a function.',
    );
  }

  private sum(): Node {
    this.enter();
    const terms: Term[] = [];
    let negative = this.takeSign() ?? false;
    for (;;) {
      terms.push({ negative, node: this.product() });
      const sign = this.takeSign();
      if (sign === null) break;
      negative = sign;
    }
    this.depth -= 1;
    const [first] = terms;
    if (first !== undefined && terms.length === 1 && !first.negative) return first.node;
    return this.made({ kind: 'sum', terms, span: around(terms.map((term) => term.node)) });
  }

  private product(): Node {
    const factors: Factor[] = [{ join: 'implied', node: this.power() }];
    for (;;) {
      const token = this.tokens[this.at];
      if (token === undefined) break;
      if (this.isSymbol('*') || this.isSymbol('/')) {
        this.at += 1;
        factors.push({
          join: token.kind === 'symbol' && token.symbol === '/' ? '/' : '*',
          node: this.power(),
        });
      } else if (startsPrimary(token)) {
        if (token.kind === 'number' && factors.at(-1)?.node.kind === 'number') {
          throw new ExpressionError(token.span, 'Two numbers stand side by side. Put * + or − between them.');
        }
        factors.push({ join: 'implied', node: this.power() });
      } else break;
    }
    const [first] = factors;
    if (first !== undefined && factors.length === 1) return first.node;
    return this.made({ kind: 'product', factors, span: around(factors.map((factor) => factor.node)) });
  }

  private power(): Node {
    this.enter();
    const start = this.tokens[this.at]?.span.start ?? this.length;
    const sign = this.takeSign();
    let node: Node;
    if (sign !== null) {
      const inner = this.power();
      node = sign
        ? this.made({
            kind: 'sum',
            terms: [{ negative: true, node: inner }],
            span: { start, end: inner.span.end },
          })
        : inner;
    } else {
      node = this.primary();
      if (this.isSymbol('^')) {
        this.at += 1;
        const exponent = this.power();
        node = this.made({ kind: 'power', base: node, exponent, span: around([node, exponent]) });
      }
    }
    this.depth -= 1;
    return node;
  }

  private primary(): Node {
    const token = this.tokens[this.at];
    if (token === undefined) throw this.endsEarly();
    this.at += 1;
    switch (token.kind) {
      case 'number':
      case 'constant':
      case 'unit':
      case 'state':
      case 'ket':
        return this.made(token);
      case 'function':
        return this.call(token.name, token.span);
      case 'symbol':
        if (token.symbol === '(') return this.bracketed(token.span);
        if (token.symbol === '[') return this.column(token.span);
        if (token.symbol === '√') return this.root(token.span);
        throw new ExpressionError(
          token.span,
          `Something is missing before this ${token.symbol}. Write a number or a state.`,
        );
    }
  }

  private bracketed(open: Span): Node {
    const inner = this.sum();
    const end = this.close(')', open);
    return { ...inner, span: { start: open.start, end } };
  }

  private column(open: Span): Node {
    const first = this.sum();
    if (!this.isSymbol(',')) {
      throw new ExpressionError(this.here(), 'A column has two parts, of H and of V. Write it as [1, i].');
    }
    this.at += 1;
    const second = this.sum();
    if (this.isSymbol(',')) {
      throw new ExpressionError(this.here(), 'A column has two parts, of H and of V, and this is a third.');
    }
    const end = this.close(']', open);
    return this.made({ kind: 'column', entries: [first, second], span: { start: open.start, end } });
  }

  private root(sign: Span): Node {
    this.enter();
    const arg = this.primary();
    this.depth -= 1;
    return this.made({
      kind: 'call',
      name: 'sqrt',
      args: [arg],
      span: { start: sign.start, end: arg.span.end },
    });
  }

  private call(name: FunctionName, span: Span): Node {
    const { count, form } = SIGNATURES[name];
    if (!this.isSymbol('('))
      throw new ExpressionError(span, `${name} takes its argument in brackets: ${form}.`);
    const open = this.here();
    this.at += 1;
    const args: Node[] = [];
    if (!this.isSymbol(')')) {
      args.push(this.sum());
      while (this.isSymbol(',')) {
        const comma = this.here();
        this.at += 1;
        if (args.length === count) throw new ExpressionError(comma, tooMany(name, count, form));
        args.push(this.sum());
      }
    }
    const end = this.close(')', open);
    if (args.length < count) {
      const parts = count === 1 ? 'one argument' : `${count} arguments`;
      throw new ExpressionError(
        { start: span.start, end },
        `${name} takes ${parts} and has ${args.length}: ${form}.`,
      );
    }
    return this.made({ kind: 'call', name, args, span: { start: span.start, end } });
  }

  private close(symbol: ')' | ']', open: Span): number {
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

  private takeSign(): boolean | null {
    const negative = this.isSymbol('-');
    if (!negative && !this.isSymbol('+')) return null;
    this.at += 1;
    return negative;
  }

  private isSymbol(symbol: Symbol): boolean {
    const token = this.tokens[this.at];
    return token?.kind === 'symbol' && token.symbol === symbol;
  }

  private here(): Span {
    return this.tokens[this.at]?.span ?? { start: this.length, end: this.length + 1 };
  }

  private endsEarly(): ExpressionError {
    const last = this.tokens[this.tokens.length - 1];
    const span = last?.span ?? { start: 0, end: 1 };
    return new ExpressionError(span, 'The expression ends here before it is complete. Write what follows.');
  }

  private enter(): void {
    this.depth += 1;
    // A bracket costs two levels of ours, its sum and its power; the limit counts what a person nests.
    if (this.depth > 2 * MAX_DEPTH) {
      throw new ExpressionError(this.here(), `This is nested deeper than ${MAX_DEPTH} levels.`);
    }
  }

  private made<T extends Node>(node: T): T {
    this.nodes += 1;
    if (this.nodes > MAX_NODES) {
      throw new ExpressionError(node.span, `This has more than ${MAX_NODES} numbers, names and operations.`);
    }
    return node;
  }
}

function tooMany(name: FunctionName, count: number, form: string): string {
  return `${name} takes ${count === 1 ? 'one argument' : `${count} arguments`}, and this begins one more: ${form}.`;
}

function startsPrimary(token: Token): boolean {
  return token.kind !== 'symbol' || token.symbol === '(' || token.symbol === '[' || token.symbol === '√';
}

function around(nodes: readonly Node[]): Span {
  return { start: nodes[0]?.span.start ?? 0, end: nodes.at(-1)?.span.end ?? 1 };
}
