import type { FunctionName } from './tree';

interface Signature {
  readonly count: number;
  /** How a call of it is written. */
  readonly form: string;
}

/** How many arguments each function takes. */
export const SIGNATURES: Readonly<Record<FunctionName, Signature>> = {
  sqrt: { count: 1, form: 'sqrt(2)' },
  exp: { count: 1, form: 'exp(i 45deg)' },
  cos: { count: 1, form: 'cos(22.5deg)' },
  sin: { count: 1, form: 'sin(22.5deg)' },
  linear: { count: 1, form: 'linear(22.5deg)' },
  bloch: { count: 2, form: 'bloch(90deg, 45deg)' },
  ellipse: { count: 2, form: 'ellipse(20deg, 10deg)' },
  stokes: { count: 3, form: 'stokes(0.6, 0, 0.8)' },
  rotate: { count: 2, form: 'rotate(x, 90deg)' },
  zyz: { count: 3, form: 'zyz(30deg, 45deg, 60deg)' },
  qwp: { count: 1, form: 'qwp(45deg)' },
  hwp: { count: 1, form: 'hwp(22.5deg)' },
  plate: { count: 2, form: 'plate(120deg, 30deg)' },
};

export function tooMany(name: FunctionName): string {
  const { count, form } = SIGNATURES[name];
  return `${name} takes ${parts(count)}, and this begins one more: ${form}.`;
}

export function tooFew(name: FunctionName, found: number): string {
  const { count, form } = SIGNATURES[name];
  return `${name} takes ${parts(count)} and has ${found}: ${form}.`;
}

function parts(count: number): string {
  return count === 1 ? 'one argument' : `${count} arguments`;
}
