import type { Convention } from '../convention';
import { type JonesVector, jonesNorm, normaliseJones } from '../jones';
import { jonesToStokes, type Stokes } from '../stokes';
import { evaluateState } from './evaluate';
import { toLatex } from './latex';
import { parse } from './parse';
import { print } from './print';
import { ExpressionError, type ExpressionProblem } from './span';

export type StateReading =
  | {
      readonly ok: true;
      /** Canonical frame, length 1, global phase fixed. */
      readonly jones: JonesVector;
      readonly stokes: Stokes;
      /** Length of the Jones vector as written. */
      readonly norm: number;
      /** Whether it had to be brought to length 1, by more than rounding. */
      readonly normalised: boolean;
      /** The expression in the one canonical way of writing it; parses to the same value. */
      readonly canonical: string;
      /** For the math renderer. */
      readonly latex: string;
    }
  | { readonly ok: false; readonly error: ExpressionProblem };

const NORM_ROUNDING = 1e-9;

/** Reads a state as a lab with this convention writes it. Never throws for any source. */
export function parseState(source: string, convention: Convention): StateReading {
  try {
    const tree = parse(source);
    const written = evaluateState(tree, { source, convention });
    const norm = jonesNorm(written);
    const jones = normaliseJones(written);
    return {
      ok: true,
      jones,
      stokes: jonesToStokes(jones),
      norm,
      normalised: Math.abs(norm - 1) > NORM_ROUNDING,
      canonical: print(tree),
      latex: toLatex(tree),
    };
  } catch (error) {
    if (error instanceof ExpressionError) return { ok: false, error: error.toProblem() };
    throw error;
  }
}
