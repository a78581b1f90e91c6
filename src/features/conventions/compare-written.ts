import {
  type Convention,
  type ExpressionProblem,
  parseState,
  parseStokes,
  parseUnitary,
  type Quaternion,
  type Stokes,
} from '../../../shared/optics';
import type { WrittenKind } from './address';
import { type Chosen, type ComparedRow, comparedRows, type OwnConvention } from './compared-rows';
import { stateParts, unitaryParts } from './written-parts';

interface Read {
  readonly latex: string;
  readonly rows: readonly ComparedRow[];
  /** The length or size that was divided away; null where it was 1. */
  readonly size: number | null;
}

export type ComparedWritten =
  | { readonly kind: 'empty' }
  | { readonly kind: 'unreadable'; readonly error: ExpressionProblem }
  | (Read & { readonly kind: 'state'; readonly stokes: Stokes })
  | (Read & { readonly kind: 'unitary'; readonly unitary: Quaternion });

/** Only a pure state has a length: partly polarised light keeps its own. */
function lengthOf(source: string, convention: Convention): number | null {
  const pure = parseState(source, convention);
  return pure.ok && pure.normalised ? pure.norm : null;
}

/** What is typed, read in the convention that it is typed in and written in all of them. Never throws for any source. */
export function compareWritten(
  kind: WrittenKind,
  source: string,
  chosen: Chosen,
  own: OwnConvention | null,
): ComparedWritten {
  if (source.trim() === '') return { kind: 'empty' };
  if (kind === 'state') {
    const reading = parseStokes(source, chosen.convention);
    if (!reading.ok) return { kind: 'unreadable', error: reading.error };
    const { stokes, latex } = reading;
    const rows = comparedRows((convention) => stateParts(stokes, convention), chosen, own);
    return { kind, stokes, latex, rows, size: lengthOf(source, chosen.convention) };
  }
  const reading = parseUnitary(source, chosen.convention);
  if (!reading.ok) return { kind: 'unreadable', error: reading.error };
  const { quaternion: unitary, latex, normalised, scale } = reading;
  const rows = comparedRows((convention) => unitaryParts(unitary, convention), chosen, own);
  return { kind, unitary, latex, rows, size: normalised ? scale : null };
}
