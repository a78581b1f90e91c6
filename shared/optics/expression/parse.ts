import { Cursor } from './cursor';
import { MAX_LENGTH } from './limits';
import { around, ExpressionError, type Span } from './span';
import { SIGNATURES, tooFew, tooMany } from './signatures';
import { type Token, tokenise } from './tokens';
import type { Factor, FunctionName, GateName, Node, Row, Term } from './tree';
import type { Wanted } from './words';

/**
 * The typed tree of a source, by recursive descent in one pass.
 *
 *     sum     = [sign] product { sign product }
 *     product = power { ("*" | "/" | nothing) power }      left to right: 1/2 i is i/2
 *     power   = sign power | primary {dagger} [ "^" (power | dagger) {dagger} ]
 *     primary = number | constant | unit | state | ket | gate | "√" primary | function "(" sum {"," sum} ")"
 *             | "(" sum ")" | "[" sum "," sum "]" | "dagger" "(" sum ")" | "from" sum "to" sum
 *             | "matrix" "[" "[" sum "," sum "]" "," "[" sum "," sum "]" "]"
 *     dagger  = "†" | "dagger"            without a bracket behind it
 *
 * The first argument of rotate may also hold x, y, z and columns of three.
 *
 * @throws ExpressionError with the place of the first thing that doesn't fit, and at the limits of limits.ts.
 */
export function parse(source: string, wanted: Wanted = 'state'): Node {
  if (source.length > MAX_LENGTH) {
    throw new ExpressionError(
      { start: MAX_LENGTH, end: source.length },
      `This is ${source.length} characters long. Expressions end at ${MAX_LENGTH}.`,
    );
  }
  const parser = new Parser(tokenise(source, wanted), source.length);
  return parser.whole(wanted);
}

class Parser extends Cursor {
  private inAxis = false;

  whole(wanted: Wanted): Node {
    if (this.tokens.length === 0) {
      const what =
        wanted === 'state'
          ? 'a state, such as H or (H + i V)/sqrt(2)'
          : 'a unitary, such as hadamard or rotate(x, 90deg)';
      throw new ExpressionError({ start: 0, end: 1 }, `Nothing is written here. Write ${what}.`);
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
    if (rest.kind === 'word') {
      throw new ExpressionError(rest.span, `"${rest.name}" belongs behind from: from H to D.`);
    }
    throw new ExpressionError(
      rest.span,
      'A comma stands only between the parts of a column or of a function.',
    );
  }

  private sum(): Node {
    this.enter();
    const terms: Term[] = [];
    const start = this.here().start;
    let negative = this.takeSign() ?? false;
    for (;;) {
      terms.push({ negative, node: this.product() });
      const sign = this.takeSign();
      if (sign === null) break;
      negative = sign;
    }
    this.leave();
    const [first] = terms;
    if (first !== undefined && terms.length === 1 && !first.negative) return first.node;
    const { end } = around(terms.map((term) => term.node));
    return this.made({ kind: 'sum', terms, span: { start, end } });
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
      } else if (startsPrimary(token) || (token.kind === 'word' && this.startsUnitary(token.name))) {
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
      // "X^2†" is (X^2)†: a number takes no dagger.
      if (node.kind !== 'number') node = this.daggers(node);
      if (this.isSymbol('^')) {
        this.at += 1;
        if (!this.isDagger()) {
          const exponent = this.power();
          node = this.made({ kind: 'power', base: node, exponent, span: around([node, exponent]) });
        }
        node = this.daggers(node);
      }
    }
    this.leave();
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
      case 'gate':
        return this.made(token);
      case 'axis':
        if (this.inAxis) return this.made(token);
        throw new ExpressionError(
          token.span,
          `${token.name} is an axis and stands in rotate(${token.name}, 90deg). The gate is ${token.name.toUpperCase()}.`,
          token.name.toUpperCase(),
        );
      case 'function':
        return this.call(token.name, token.span);
      case 'word':
        return this.unitary(token.name, token.span);
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
    if (this.isSymbol('[')) {
      throw new ExpressionError(
        open,
        'A matrix is written with its name in front: matrix [[1, 0], [0, i]].',
        'matrix [',
      );
    }
    const first = this.sum();
    if (!this.isSymbol(',')) {
      throw new ExpressionError(this.here(), 'A column has two parts, of H and of V. Write it as [1, i].');
    }
    this.at += 1;
    const second = this.sum();
    if (this.inAxis && this.isSymbol(',')) {
      this.at += 1;
      const third = this.sum();
      const end = this.close(']', open);
      return this.made({ kind: 'vector', entries: [first, second, third], span: { start: open.start, end } });
    }
    if (this.isSymbol(',')) {
      throw new ExpressionError(this.here(), 'A column has two parts, of H and of V, and this is a third.');
    }
    const end = this.close(']', open);
    return this.made({ kind: 'column', entries: [first, second], span: { start: open.start, end } });
  }

  private root(sign: Span): Node {
    this.enter();
    const arg = this.primary();
    this.leave();
    return this.rootOf(arg, { start: sign.start, end: arg.span.end });
  }

  /** √X and sqrt(X) are the gate sqrtX. */
  private rootOf(arg: Node, span: Span): Node {
    const named = arg.kind === 'gate' ? ROOTS.get(arg.name) : undefined;
    if (named !== undefined) return this.made({ kind: 'gate', name: named, span });
    return this.made({ kind: 'call', name: 'sqrt', args: [arg], span });
  }

  private call(name: FunctionName, span: Span): Node {
    const { count, form } = SIGNATURES[name];
    if (!this.isSymbol('('))
      throw new ExpressionError(span, `${name} takes its argument in brackets: ${form}.`);
    const open = this.here();
    this.at += 1;
    const args: Node[] = [];
    const outer = this.inAxis;
    this.inAxis = name === 'rotate';
    if (!this.isSymbol(')')) {
      args.push(this.sum());
      this.inAxis = false;
      while (this.isSymbol(',')) {
        const comma = this.here();
        this.at += 1;
        if (args.length === count) throw new ExpressionError(comma, tooMany(name));
        args.push(this.sum());
      }
    }
    this.inAxis = outer;
    const end = this.close(')', open);
    const [first] = args;
    if (args.length < count || first === undefined) {
      throw new ExpressionError({ start: span.start, end }, tooFew(name, args.length));
    }
    if (name === 'sqrt') return this.rootOf(first, { start: span.start, end });
    return this.made({ kind: 'call', name, args, span: { start: span.start, end } });
  }

  /** What one of the words of unitaries begins. */
  private unitary(name: 'from' | 'to' | 'matrix' | 'dagger' | '†', span: Span): Node {
    switch (name) {
      case 'matrix':
        return this.matrix(span);
      case 'from': {
        const from = this.sum();
        const token = this.tokens[this.at];
        if (token?.kind !== 'word' || token.name !== 'to') {
          throw new ExpressionError(
            token?.span ?? span,
            'from is followed by a state, to and another: from H to D.',
          );
        }
        this.at += 1;
        const to = this.sum();
        return this.made({ kind: 'turn', from, to, span: { start: span.start, end: to.span.end } });
      }
      case 'to':
        throw new ExpressionError(span, '"to" belongs behind from: from H to D.');
      case '†':
        throw new ExpressionError(span, 'A dagger stands behind the unitary that it turns back: S†.');
      case 'dagger': {
        const open = this.here();
        if (!this.isSymbol('(')) {
          throw new ExpressionError(
            span,
            'dagger takes a unitary in brackets or stands behind one: dagger(S), S dagger.',
          );
        }
        this.at += 1;
        const base = this.sum();
        const end = this.close(')', open);
        return this.made({ kind: 'dagger', base, span: { start: span.start, end } });
      }
    }
  }

  private matrix(span: Span): Node {
    const open = this.here();
    this.open('[', span, MATRIX_FORM);
    const first = this.row(span);
    if (!this.isSymbol(',')) throw new ExpressionError(this.here(), MATRIX_FORM);
    this.at += 1;
    const second = this.row(span);
    if (this.isSymbol(',')) throw new ExpressionError(this.here(), MATRIX_FORM);
    const end = this.close(']', open);
    return this.made({ kind: 'matrix', rows: [first, second], span: { start: span.start, end } });
  }

  private row(span: Span): Row {
    const open = this.here();
    this.open('[', span, MATRIX_FORM);
    const first = this.sum();
    if (!this.isSymbol(',')) throw new ExpressionError(this.here(), MATRIX_FORM);
    this.at += 1;
    const second = this.sum();
    if (this.isSymbol(',')) throw new ExpressionError(this.here(), MATRIX_FORM);
    this.close(']', open);
    return [first, second];
  }

  /** The daggers behind a unitary; two of them cancel. */
  private daggers(node: Node): Node {
    let count = 0;
    let end = node.span.end;
    while (this.isDagger()) {
      end = this.here().end;
      this.at += 1;
      count += 1;
    }
    if (count % 2 === 0) return node;
    return this.made({ kind: 'dagger', base: node, span: { start: node.span.start, end } });
  }

  private startsUnitary(name: string): boolean {
    return name === 'from' || name === 'matrix' || name === 'dagger';
  }
}

const MATRIX_FORM = 'A matrix has two rows of two: matrix [[1, 0], [0, i]].';

const ROOTS = new Map<GateName, GateName>([
  ['X', 'sqrtX'],
  ['Y', 'sqrtY'],
  ['Z', 'sqrtZ'],
]);

function startsPrimary(token: Token): boolean {
  if (token.kind === 'word') return false;
  return token.kind !== 'symbol' || token.symbol === '(' || token.symbol === '[' || token.symbol === '√';
}
