import type { Factor, Node, Term } from './tree';

/** The canonical text of a tree: one way to write each tree, which parses back to the same value. */
export function print(node: Node): string {
  switch (node.kind) {
    case 'number':
      return String(node.value);
    case 'constant':
    case 'unit':
    case 'state':
    case 'gate':
    case 'axis':
      return node.name;
    case 'ket':
      return `|${node.label}>`;
    case 'sum':
      return node.terms.map(printTerm).join('');
    case 'product':
      return node.factors.map(printFactor).join('');
    case 'power':
      return `${printTight(node.base)}^${printTight(node.exponent)}`;
    case 'call':
      return `${node.name}(${node.args.map(print).join(', ')})`;
    case 'dagger':
      return `dagger(${print(node.base)})`;
    case 'column':
    case 'vector':
      return printRow(node.entries);
    case 'matrix':
      return `matrix [${node.rows.map(printRow).join(', ')}]`;
    case 'turn':
      return `from ${print(node.from)} to ${print(node.to)}`;
  }
}

function printRow(entries: readonly Node[]): string {
  return `[${entries.map(print).join(', ')}]`;
}

function printTerm({ negative, node }: Term, index: number): string {
  // "from … to" takes all that follows, so it is closed off wherever something may follow.
  const body = node.kind === 'sum' || node.kind === 'turn' ? `(${print(node)})` : print(node);
  if (index === 0) return negative ? `-${body}` : body;
  return `${negative ? ' - ' : ' + '}${body}`;
}

function printFactor({ join, node }: Factor, index: number, all: readonly Factor[]): string {
  const bracketed = node.kind === 'sum' || node.kind === 'product' || node.kind === 'turn';
  const body = bracketed ? `(${print(node)})` : print(node);
  if (index === 0) return body;
  if (join !== 'implied') return `${join}${body}`;
  const afterNumber = all[index - 1]?.node.kind === 'number';
  // A unit stands close to its number: 22.5deg. A number beside a number needs brackets to stay apart from it.
  if (afterNumber && node.kind === 'unit') return body;
  return afterNumber && startsWithDigit(body) ? ` (${body})` : ` ${body}`;
}

function startsWithDigit(text: string): boolean {
  const first = text.charAt(0);
  return first >= '0' && first <= '9';
}

function printTight(node: Node): string {
  return node.kind === 'sum' || node.kind === 'product' || node.kind === 'power' || node.kind === 'turn'
    ? `(${print(node)})`
    : print(node);
}
