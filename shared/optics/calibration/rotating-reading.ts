import { wrap } from '../units';
import { SETTLED_SIGMA } from './evidence';
import type { OffsetEstimate, PlateFinding } from './linear-reading';
import {
  blindNearDeg,
  type BranchChoice,
  candidatePlates,
  type OpenQuestion,
  otherName,
  type PlateReading,
  type SettledQuestion,
} from './open-questions';
import type { RetardanceEstimate } from './retardance-estimate';

export interface RotatingRivals {
  /** By how many σ the best plate that turns the other way is worse. */
  readonly acrossSigmas: number;
  /** Other plates on this side that fit within `SETTLED_SIGMA`. */
  readonly others: readonly (PlateReading & { readonly sigmas: number })[];
}

/**
 * With the plate told from the one that undoes it, axis and branch are both settled: of its two names either is right, and
 * the one that the nominal retardance prefers is given, or without it the one up to 180°.
 */
export function rotatingFinding({
  offset,
  retardance,
  isBlind,
  rivals,
  choice,
}: {
  readonly offset: OffsetEstimate;
  readonly retardance: RetardanceEstimate;
  readonly isBlind: boolean;
  readonly rivals: RotatingRivals;
  readonly choice: BranchChoice;
}): PlateFinding {
  const { retardanceDeg, fromDeg, toDeg } = retardance;
  const reading = { offsetDeg: offset.offsetDeg, retardanceDeg };
  const sigmas = rivals.acrossSigmas;
  const open: OpenQuestion[] = [];
  const settled: SettledQuestion[] = [];
  const isTold = sigmas >= SETTLED_SIGMA;
  if (isTold) settled.push({ kind: 'axis', sigmas, by: 'scan' });
  else {
    const offsetsDeg = [offset.offsetDeg, wrap(offset.offsetDeg + 90, 180)] as const;
    open.push({ kind: 'axis', offsetsDeg, sigmas });
  }
  if (choice.settled) settled.push({ kind: 'branch', sigmas: choice.sigmas, by: 'nominal' });
  else if (isTold) settled.push({ kind: 'branch', sigmas, by: 'scan' });
  else {
    const retardancesDeg = [retardanceDeg, 360 - retardanceDeg] as const;
    open.push({ kind: 'branch', retardancesDeg, reason: choice.reason, sigmas: choice.sigmas });
  }
  if (isBlind) open.push({ kind: 'blind', atDeg: blindNearDeg(retardanceDeg), fromDeg, toDeg });
  const [nearest] = rivals.others;
  if (nearest !== undefined)
    open.push({ kind: 'supplement', readings: [reading, ...rivals.others], sigmas: nearest.sigmas });
  const own = { ...reading, alsoNamed: otherName(reading) };
  return { offset, retardance, open, settled, candidates: isTold ? [own] : candidatePlates(reading) };
}
