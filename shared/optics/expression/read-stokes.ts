import { type Convention, readStokes } from '../convention';
import { normaliseStokes, stokesLength, type Stokes } from '../stokes';
import { evaluate } from './evaluate';
import { toLatex } from './latex';
import { parse } from './parse';
import { print } from './print';
import { parseState } from './read-state';
import { ExpressionError, type ExpressionProblem } from './span';
import { tooLong } from './states';
import { realOf } from './values';

export type StokesReading =
  | {
      readonly ok: true;
      /** Canonical, of intensity 1: its length is the degree of polarisation, at most 1. */
      readonly stokes: Stokes;
      readonly canonical: string;
      readonly latex: string;
    }
  | { readonly ok: false; readonly error: ExpressionProblem };

/**
 * Reads light to compare with: any state, or stokes(s1, s2, s3) of partly polarised light, which no plates can prepare.
 * Never throws for any source.
 */
export function parseStokes(source: string, convention: Convention): StokesReading {
  try {
    const tree = parse(source);
    if (tree.kind !== 'call' || tree.name !== 'stokes') return parseState(source, convention);
    const scope = { source, convention };
    const [s1 = 0, s2 = 0, s3 = 0] = tree.args.map((arg) => realOf(evaluate(arg, scope), arg.span));
    const stokes = readStokes({ s1, s2, s3 }, convention);
    const length = stokesLength(stokes);
    const problem = tooLong([s1, s2, s3], length, tree.span);
    if (problem !== null) throw problem;
    // Rounding in the typed digits may take fully polarised light a little past 1.
    const within = length > 1 ? normaliseStokes(stokes) : stokes;
    return { ok: true, stokes: within, canonical: print(tree), latex: toLatex(tree) };
  } catch (error) {
    if (error instanceof ExpressionError) return { ok: false, error: error.toProblem() };
    throw error;
  }
}
