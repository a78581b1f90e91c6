import type { Stokes } from '../stokes';
import { type MissingDirection, missingDirections, nameMissing } from './missing-direction';

/**
 * What one tomography of one qubit counted: four lists of one length, an entry for each setting and port. The counts of
 * entry k are Poisson of mean λ = e (S0 + S·m)/2 + d.
 */
export interface MeasuredCounts {
  /** m: the canonical Stokes vector, length 1, of the state that the setting passes into the port. */
  readonly projectors: readonly Stokes[];
  /** n: whole numbers as the counter gave them, nothing taken off. */
  readonly counts: readonly number[];
  /** e: exposure times efficiency in any one unit, 1e-30 to 1e30. 0 stands for a port that was off. */
  readonly exposures: readonly number[];
  /** d: the dark counts expected in that exposure, not negative. */
  readonly darkCounts: readonly number[];
}

/** Why there is no state to report. `setting` is the entry's index, from 0; messages count from 1. */
export type TomographyRefusal = { readonly message: string } & (
  | { readonly reason: 'lengths' | 'no-counts' | 'no-light' }
  | {
      readonly reason: 'projector' | 'counts' | 'exposure' | 'dark-counts' | 'impossible';
      readonly setting: number;
    }
  | { readonly reason: 'incomplete'; readonly missing: readonly MissingDirection[] }
);

const LENGTH_TOLERANCE = 1e-9;
/** Exposures between one over this and this, 0 beside: any unit fits, and nothing overflows. */
const MOST_EXPOSURE = 1e30;

/** What keeps these counts from naming a state, the first thing found; null where nothing does. */
export function refusalOf(data: MeasuredCounts): TomographyRefusal | null {
  return lengthsFault(data) ?? entryFault(data) ?? incompleteFault(data) ?? lightFault(data);
}

function lengthsFault({
  projectors,
  counts,
  exposures,
  darkCounts,
}: MeasuredCounts): TomographyRefusal | null {
  const count = projectors.length;
  if (counts.length === count && exposures.length === count && darkCounts.length === count) return null;
  return {
    reason: 'lengths',
    message: `Each setting takes one projector, one count, one exposure and one number of dark counts; there are ${count}, ${counts.length}, ${exposures.length} and ${darkCounts.length}.`,
  };
}

function entryFault({ projectors, counts, exposures, darkCounts }: MeasuredCounts): TomographyRefusal | null {
  for (const [setting, [s1, s2, s3]] of projectors.entries()) {
    const n = counts[setting] ?? NaN;
    const e = exposures[setting] ?? NaN;
    const d = darkCounts[setting] ?? NaN;
    const length = Math.sqrt(s1 * s1 + s2 * s2 + s3 * s3);
    if (!(Math.abs(length - 1) <= LENGTH_TOLERANCE)) {
      const message = `Setting ${setting + 1} projects on (${s1}, ${s2}, ${s3}), which has length ${length}; the Stokes vector of a projector has length 1.`;
      return { reason: 'projector', setting, message };
    }
    if (!(Number.isSafeInteger(n) && n >= 0)) {
      const message = `Setting ${setting + 1} has ${n} counts; counts are whole numbers from 0 up. Give what the counter read, with the exposure and the dark counts beside it, not a rate or a difference.`;
      return { reason: 'counts', setting, message };
    }
    if (!(e === 0 || (e >= 1 / MOST_EXPOSURE && e <= MOST_EXPOSURE))) {
      const message = `Setting ${setting + 1} has an exposure of ${e}; it is 0 or lies between ${1 / MOST_EXPOSURE} and ${MOST_EXPOSURE}.`;
      return { reason: 'exposure', setting, message };
    }
    if (!(d >= 0 && d <= Number.MAX_SAFE_INTEGER)) {
      const message = `Setting ${setting + 1} expects ${d} dark counts; that is a number from 0 up, no larger than a count can be.`;
      return { reason: 'dark-counts', setting, message };
    }
  }
  return null;
}

function incompleteFault({ projectors, exposures }: MeasuredCounts): TomographyRefusal | null {
  const missing = missingDirections(projectors, exposures);
  if (missing.length === 0) return null;
  const names = missing.map(nameMissing).join('; ');
  return {
    reason: 'incomplete',
    missing,
    message: `These settings say nothing about ${names}. Add a setting whose projector has a part along it.`,
  };
}

function lightFault({ projectors, counts, exposures, darkCounts }: MeasuredCounts): TomographyRefusal | null {
  if (counts.every((n, k) => n === 0 || exposures[k] === 0)) {
    return {
      reason: 'no-counts',
      message: 'No setting with an exposure has a count, so there is no light to describe.',
    };
  }
  const setting = counts.findIndex((n, k) => n > 0 && exposures[k] === 0 && darkCounts[k] === 0);
  if (setting >= 0) {
    const message = `Setting ${setting + 1} has ${counts[setting] ?? 0} counts with no exposure and no dark counts to come from. Give its exposure or its dark counts.`;
    return { reason: 'impossible', setting, message };
  }
  // The slope of log L at no light at all. Where −slope lies in the cone of states, light only lowers log L: a maximum there.
  const [slope0, slope1, slope2, slope3] = slopeInTheDark(projectors, counts, exposures, darkCounts);
  if (!(-slope0 >= Math.sqrt(slope1 * slope1 + slope2 * slope2 + slope3 * slope3))) return null;
  return {
    reason: 'no-light',
    message:
      'The dark counts alone explain these counts best, so there is no light to describe. Measure longer, or correct the dark counts.',
  };
}

function slopeInTheDark(
  projectors: readonly Stokes[],
  counts: readonly number[],
  exposures: readonly number[],
  darkCounts: readonly number[],
): readonly [number, number, number, number] {
  const slope: [number, number, number, number] = [0, 0, 0, 0];
  for (const [k, [s1, s2, s3]] of projectors.entries()) {
    const n = counts[k] ?? 0;
    const e = exposures[k] ?? 0;
    // 0 · ln λ has no slope, and a setting that was off has none either.
    const by = e === 0 ? 0 : e * ((n === 0 ? 0 : n / (darkCounts[k] ?? 0)) - 1);
    slope[0] += by;
    slope[1] += by * s1;
    slope[2] += by * s2;
    slope[3] += by * s3;
  }
  return slope;
}
