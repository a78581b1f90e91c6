import {
  type Factor,
  type FunctionName,
  type GateName,
  isPlate,
  type KetLabel,
  type Node,
  type Term,
} from './tree';

/** The tree as TeX for the math renderer. Every letter of it comes from here, none from the source. */
export function toLatex(node: Node): string {
  switch (node.kind) {
    case 'number':
      return latexNumber(node.value);
    case 'constant':
      return node.name === 'pi' ? '\\pi' : node.name;
    case 'unit':
      return node.name === 'deg' ? '^{\\circ}' : '\\,\\mathrm{rad}';
    case 'state':
      return ket(node.name);
    case 'ket':
      return ket(node.label);
    case 'sum':
      return node.terms.map(latexTerm).join('');
    case 'product':
      return latexProduct(node.factors);
    case 'power':
      return `{${tight(node.base)}}^{${toLatex(node.exponent)}}`;
    case 'call':
      return latexCall(node.name, node.args);
    case 'gate':
      return latexGate(node.name);
    case 'axis':
      return node.name;
    case 'dagger':
      return `{${tight(node.base)}}^{\\dagger}`;
    case 'column':
      return latexMatrix(node.entries.map((entry) => [entry]));
    case 'matrix':
      return latexMatrix(node.rows);
    case 'vector':
      return brackets(node.entries.map(toLatex).join(',\\ '));
    case 'turn':
      return `${toLatex(node.from)}\\mapsto ${toLatex(node.to)}`;
  }
}

function ket(label: KetLabel): string {
  return `|${label}\\rangle`;
}

function latexGate(name: GateName): string {
  switch (name) {
    case 'identity':
      return 'I';
    case 'hadamard':
      // H is horizontal light throughout.
      return '\\mathrm{Had}';
    case 'sqrtX':
    case 'sqrtY':
    case 'sqrtZ':
      return `\\sqrt{${name.charAt(4)}}`;
    default:
      return name;
  }
}

function latexMatrix(rows: readonly (readonly Node[])[]): string {
  const lines = rows.map((row) => row.map(toLatex).join('&'));
  return `\\begin{pmatrix}${lines.join('\\\\')}\\end{pmatrix}`;
}

/** Longer numbers are typeset with so many figures and dots behind them: the whole of them stands in the source. */
const MOST_FIGURES = 7;
const SHOWN_FIGURES = 5;

function latexNumber(value: number): string {
  const [mantissa = '', exponent] = String(value).split('e');
  const cut = mantissa.replace(/^0\./u, '').replace('.', '').length > MOST_FIGURES;
  const shown = cut ? `${cutOff(mantissa)}\\ldots` : mantissa;
  return exponent === undefined ? shown : `${shown}\\times 10^{${exponent.replace('+', '')}}`;
}

/** The first figures as they are, not rounded: dots promise that they go on. */
function cutOff(digits: string): string {
  const leading = /^0\.0*/u.exec(digits)?.[0].length ?? 0;
  const withPoint = leading === 0 && digits.indexOf('.') <= SHOWN_FIGURES && digits.includes('.') ? 1 : 0;
  const whole = digits.includes('.') ? digits.indexOf('.') : digits.length;
  return digits.slice(0, Math.max(leading + SHOWN_FIGURES + withPoint, whole));
}

function latexTerm({ negative, node }: Term, index: number): string {
  const body = isSum(node) ? brackets(toLatex(node)) : toLatex(node);
  if (index === 0) return negative ? `-${body}` : body;
  return `${negative ? '-' : '+'}${body}`;
}

// (H + iV)/√2 reads best with its factor in front: 1/√2 (|H⟩ + i|V⟩); a quotient of numbers as a fraction.
function latexProduct(factors: readonly Factor[]): string {
  const last = factors.at(-1);
  if (last?.join !== '/') return factors.reduce(latexFactor, '');
  const before = factors.slice(0, -1);
  const [only] = before;
  const den = toLatex(last.node);
  if (only !== undefined && before.length === 1) {
    return holdsState(only.node)
      ? `\\frac{1}{${den}}${isSum(only.node) ? brackets(toLatex(only.node)) : toLatex(only.node)}`
      : `\\frac{${toLatex(only.node)}}{${den}}`;
  }
  return before.some(({ node }) => holdsState(node))
    ? `\\frac{1}{${den}}${latexProduct(before)}`
    : `\\frac{${latexProduct(before)}}{${den}}`;
}

function latexFactor(left: string, { join, node }: Factor, index: number, all: readonly Factor[]): string {
  const body = isSum(node) || node.kind === 'product' ? brackets(toLatex(node)) : toLatex(node);
  if (left === '') return body;
  if (join === '/') return `\\frac{${left}}{${toLatex(node)}}`;
  if (join === '*') return `${left}\\cdot ${body}`;
  const before = all[index - 1]?.node;
  // A list of plates in beam order must not look like a matrix product.
  if (before !== undefined && isPlate(before) && isPlate(node)) return `${left}\\rightarrow ${body}`;
  return node.kind === 'unit' ? `${left}${body}` : `${left}\\,${body}`;
}

function isSum(node: Node): boolean {
  return node.kind === 'sum' || node.kind === 'turn';
}

const NUMBERS: ReadonlySet<FunctionName> = new Set(['sqrt', 'exp', 'cos', 'sin']);

/** Whether a state or a unitary is in it, rather than numbers only. */
function holdsState(node: Node): boolean {
  switch (node.kind) {
    case 'state':
    case 'ket':
    case 'column':
    case 'gate':
    case 'dagger':
    case 'matrix':
    case 'turn':
      return true;
    case 'power':
      return holdsState(node.base);
    case 'sum':
      return node.terms.some((term) => holdsState(term.node));
    case 'product':
      return node.factors.some((factor) => holdsState(factor.node));
    case 'call':
      return !NUMBERS.has(node.name);
    default:
      return false;
  }
}

function latexCall(name: FunctionName, args: readonly Node[]): string {
  const [first] = args;
  if (name === 'sqrt' && first !== undefined) return `\\sqrt{${toLatex(first)}}`;
  if (name === 'exp' && first !== undefined) return `e^{${toLatex(first)}}`;
  if (name === 'rotate' && first !== undefined) {
    return `R_{${toLatex(first)}}${brackets(args.slice(1).map(toLatex).join(',\\ '))}`;
  }
  const inner = args.map(toLatex).join(',\\ ');
  if (name === 'cos' || name === 'sin') {
    // cos 22.5° needs no brackets; cos(a + b) does.
    return first !== undefined && !isSum(first) ? `\\${name} ${inner}` : `\\${name}${brackets(inner)}`;
  }
  return `\\mathrm{${name}}${brackets(inner)}`;
}

function brackets(inner: string): string {
  // Without the empty delimiters TeX sets a gap between a function's name and its bracket.
  return `\\mathopen{}\\left(${inner}\\right)\\mathclose{}`;
}

function tight(node: Node): string {
  return isSum(node) || node.kind === 'product' || node.kind === 'power' || node.kind === 'dagger'
    ? brackets(toLatex(node))
    : toLatex(node);
}
