import { wrap } from '../units';
import { asStudentSigmas, INTERVAL_SIGMA, type ScatterFreedom } from './evidence';
import {
  type CandidatePlate,
  candidatePlates,
  chooseBranch,
  type NominalRetardance,
  type OpenQuestion,
  type SettledQuestion,
} from './open-questions';
import type { LinearRetardance, RetardanceEstimate } from './retardance-estimate';

/** An offset with its error. */
export interface OffsetEstimate {
  /** Reading of the dial with the fast axis at H, in [0, 180). */
  readonly offsetDeg: number;
  readonly sigmaDeg: number;
  /** Half of the interval about it that holds the truth at `INTERVAL_SIGMA`. */
  readonly reachDeg: number;
}

/** What a scan says of the plate, and what it doesn't. */
export interface PlateFinding {
  readonly offset: OffsetEstimate;
  /** Null where the rows can't tell it (see `open`). */
  readonly retardance: RetardanceEstimate | null;
  readonly open: readonly OpenQuestion[];
  readonly settled: readonly SettledQuestion[];
  /** The plates that fit, likelier first; empty without a retardance. */
  readonly candidates: readonly CandidatePlate[];
}

export function offsetEstimate(offsetDeg: number, sigmaDeg: number, freedom: ScatterFreedom): OffsetEstimate {
  return { offsetDeg, sigmaDeg, reachDeg: asStudentSigmas(INTERVAL_SIGMA, freedom) * sigmaDeg };
}

/** The same estimate on the other branch, 360° − δ. */
export function onOtherBranch({
  retardanceDeg,
  sigmaDeg,
  fromDeg,
  toDeg,
}: RetardanceEstimate): RetardanceEstimate {
  return { retardanceDeg: 360 - retardanceDeg, sigmaDeg, fromDeg: 360 - toDeg, toDeg: 360 - fromDeg };
}

/** @param offset modulo 90°: which of the two is the fast axis, linear light never tells. */
export function linearFinding(
  offset: OffsetEstimate,
  retardance: LinearRetardance | null,
  nominal: NominalRetardance | null,
  wants: 'power' | 'leak-or-power',
): PlateFinding {
  const offsetsDeg = [offset.offsetDeg, wrap(offset.offsetDeg + 90, 180)] as const;
  const axis: OpenQuestion = { kind: 'axis', offsetsDeg, sigmas: null };
  if (retardance === null) {
    const open: readonly OpenQuestion[] = [axis, { kind: 'retardance', wants }];
    return { offset, retardance: null, open, settled: [], candidates: [] };
  }
  const { estimate, isBlind } = retardance;
  const measured = { value: estimate.retardanceDeg, sigma: estimate.sigmaDeg };
  const choice = chooseBranch(measured, nominal, isBlind);
  const named = choice.settled && !choice.isFirst ? onOtherBranch(estimate) : estimate;
  const open: OpenQuestion[] = [axis];
  if (!choice.settled) {
    const retardancesDeg = [estimate.retardanceDeg, 360 - estimate.retardanceDeg] as const;
    open.push({ kind: 'branch', retardancesDeg, reason: choice.reason, sigmas: choice.sigmas });
  }
  if (isBlind) open.push({ kind: 'blind', atDeg: 180, fromDeg: estimate.fromDeg, toDeg: estimate.toDeg });
  return {
    offset,
    retardance: named,
    open,
    settled: choice.settled ? [{ kind: 'branch', sigmas: choice.sigmas, by: 'nominal' }] : [],
    candidates: candidatePlates({ offsetDeg: offset.offsetDeg, retardanceDeg: named.retardanceDeg }),
  };
}
