import type { Convention } from '../convention';
import type { Quaternion } from '../quaternion';
import { type JonesMatrix, quaternionMatrix } from '../retarder';
import { evaluateUnitary } from './evaluate';
import { conjugated } from './gates';
import { toLatex } from './latex';
import { parse } from './parse';
import { print } from './print';
import { ExpressionError, type ExpressionProblem } from './span';

export type UnitaryReading =
  | {
      readonly ok: true;
      /** Canonical frame, length 1; of q and −q, the one whose first part that isn't about 0 is positive. */
      readonly quaternion: Quaternion;
      /** The unitary as written in the lab's phase convention, with determinant 1 and the quaternion's sign. */
      readonly matrix: JonesMatrix;
      /** The size that was taken out of what was written: √½ of its Frobenius norm. Its phase is taken out too. */
      readonly scale: number;
      /** Whether that size, or what was dropped to make it unitary, is more than rounding. */
      readonly normalised: boolean;
      /** The expression in the one canonical way of writing it; parses to the same value. */
      readonly canonical: string;
      /** For the math renderer. */
      readonly latex: string;
    }
  | { readonly ok: false; readonly error: ExpressionProblem };

const SCALE_ROUNDING = 1e-9;

/** Reads a unitary as a lab with this convention writes it. Never throws for any source. */
export function parseUnitary(source: string, convention: Convention): UnitaryReading {
  try {
    const tree = parse(source, 'unitary');
    const { turn, size, distance } = evaluateUnitary(tree, { source, convention });
    const quaternion = withFixedSign(conjugated(turn, convention));
    return {
      ok: true,
      quaternion,
      matrix: quaternionMatrix(conjugated(quaternion, convention)),
      scale: size,
      normalised: Math.abs(size - 1) > SCALE_ROUNDING || distance > SCALE_ROUNDING,
      canonical: print(tree),
      latex: toLatex(tree),
    };
  } catch (error) {
    if (error instanceof ExpressionError) return { ok: false, error: error.toProblem() };
    throw error;
  }
}

// Below this a part is what rounding leaves of 0 and can't decide a sign.
const SIGNLESS = 1e-12;

/** q or −q, whichever has its first part that isn't about 0 positive. */
export function withFixedSign({ w, x, y, z }: Quaternion): Quaternion {
  const first = [w, x, y, z].find((part) => Math.abs(part) > SIGNLESS) ?? 1;
  // Adding 0 turns −0 into 0.
  return first > 0 ? { w: w + 0, x: x + 0, y: y + 0, z: z + 0 } : { w: 0 - w, x: 0 - x, y: 0 - y, z: 0 - z };
}
