import type { Span } from './span';

/** A state by its name: the same six for letters and kets, plus the numbered and signed kets. */
export type StateName = 'H' | 'V' | 'D' | 'A' | 'L' | 'R';
export type KetLabel = StateName | '0' | '1' | '+' | '-' | '+i' | '-i';
export type GateName = 'identity' | 'X' | 'Y' | 'Z' | 'S' | 'T' | 'hadamard' | 'sqrtX' | 'sqrtY' | 'sqrtZ';
export type AxisName = 'x' | 'y' | 'z';
export type PlateName = 'qwp' | 'hwp' | 'plate';
export type ConstantName = 'i' | 'pi' | 'e';
export type UnitName = 'deg' | 'rad';
export type FunctionName =
  'sqrt' | 'exp' | 'cos' | 'sin' | 'bloch' | 'stokes' | 'ellipse' | 'linear' | 'rotate' | 'zyz' | PlateName;

export interface Term {
  readonly negative: boolean;
  readonly node: Node;
}

export interface Factor {
  /** How it is joined to what stands before it; the first factor's is 'implied' and means nothing. */
  readonly join: '*' | '/' | 'implied';
  readonly node: Node;
}

/** Sums and products are lists rather than pairs, so that their depth is that of the brackets a person typed. */
export type Node =
  | { readonly kind: 'number'; readonly span: Span; readonly value: number }
  | { readonly kind: 'constant'; readonly span: Span; readonly name: ConstantName }
  | { readonly kind: 'unit'; readonly span: Span; readonly name: UnitName }
  | { readonly kind: 'state'; readonly span: Span; readonly name: StateName }
  | { readonly kind: 'ket'; readonly span: Span; readonly label: KetLabel }
  | { readonly kind: 'gate'; readonly span: Span; readonly name: GateName }
  | { readonly kind: 'sum'; readonly span: Span; readonly terms: readonly Term[] }
  | { readonly kind: 'product'; readonly span: Span; readonly factors: readonly Factor[] }
  | { readonly kind: 'power'; readonly span: Span; readonly base: Node; readonly exponent: Node }
  | { readonly kind: 'dagger'; readonly span: Span; readonly base: Node }
  | {
      readonly kind: 'call';
      readonly span: Span;
      readonly name: FunctionName;
      readonly args: readonly Node[];
    }
  | { readonly kind: 'column'; readonly span: Span; readonly entries: readonly [Node, Node] }
  | { readonly kind: 'matrix'; readonly span: Span; readonly rows: readonly [Row, Row] }
  /** from A to B: the shortest turn of the sphere. */
  | { readonly kind: 'turn'; readonly span: Span; readonly from: Node; readonly to: Node }
  /** The two ways to name an axis that are no states; the reader lets them stand in the first place of rotate only. */
  | { readonly kind: 'axis'; readonly span: Span; readonly name: AxisName }
  | { readonly kind: 'vector'; readonly span: Span; readonly entries: readonly [Node, Node, Node] };

export type Row = readonly [Node, Node];

/** A bare plate, the only thing that can stand in a list in beam order. */
export function isPlate(node: Node): boolean {
  return node.kind === 'call' && (node.name === 'qwp' || node.name === 'hwp' || node.name === 'plate');
}
