import { wrapSigned } from '../../../shared/optics/units';
import { errorBudget } from '../../../shared/optics/budget';
import { dialledInfidelity, frozenBudget } from '../../../shared/protocol/dialled';
import type { VersionContent } from '../../../shared/schemas/versions';

/** 1 − F that these dials make of one target, with the plates as the version froze them; null where they are no set of dials. */
export function madeOf(
  content: VersionContent,
  settingIndex: number,
  dialsDeg: readonly number[],
): number | null {
  const fits = content.targets[settingIndex] !== undefined && dialsDeg.length === content.bench.plates.length;
  return fits ? dialledInfidelity(content, settingIndex, dialsDeg) : null;
}

export interface DialledExpectation {
  /** 1 − F of these dials with the plates exactly as calibrated. */
  readonly infidelity: number;
  /** 5 % and 95 % points of 1 − F, to first order, under every σ that the version froze. */
  readonly low: number;
  readonly high: number;
}

/** What these dials make of one target, and the range that the frozen σ leave it; null when that can't be worked out. */
export function dialledExpectation(
  content: VersionContent,
  settingIndex: number,
  dialsDeg: readonly number[],
): DialledExpectation | null {
  const infidelity = madeOf(content, settingIndex, dialsDeg);
  if (infidelity === null) return null;
  const budget = errorBudget(frozenBudget(content, settingIndex, dialsDeg));
  return {
    infidelity,
    low: budget.expectedLow,
    high: budget.expectedHigh,
  };
}

/** What a reading other than the wanted one does to the setting. */
export interface DialCost {
  /** How far it is from the wanted mark, in degrees, above 0. */
  readonly offDeg: number;
  /** short: not as far as the turn should have gone; past: further; where the start is unknown, below or above. */
  readonly side: 'short of' | 'past' | 'below' | 'above';
  /** 1 − F with the wanted reading and with this one, the other plates as they will stand. */
  readonly wantedInfidelity: number;
  readonly typedInfidelity: number;
  readonly within: boolean;
}

interface CostInput {
  readonly content: VersionContent;
  readonly settingIndex: number;
  readonly plateIndex: number;
  readonly typedDeg: number;
  /** Where the turn began; null where nobody has said. */
  readonly fromDeg: number | null;
  /** What the other dials say, or will say, at this setting, in beam order. */
  readonly dialsDeg: readonly number[];
}

/** What it costs to keep `typedDeg`; null when it can't be worked out. */
export function dialCost({
  content,
  settingIndex,
  plateIndex,
  typedDeg,
  fromDeg,
  dialsDeg,
}: CostInput): DialCost | null {
  const wantedDeg =
    content.targets[settingIndex] === undefined ? undefined : wantedDials(content, settingIndex)[plateIndex];
  if (wantedDeg === undefined) return null;
  const withDial = (dialDeg: number) =>
    dialsDeg.map((other, plate) => (plate === plateIndex ? dialDeg : other));
  const wantedInfidelity = madeOf(content, settingIndex, withDial(wantedDeg));
  const typedInfidelity = madeOf(content, settingIndex, withDial(typedDeg));
  if (wantedInfidelity === null || typedInfidelity === null) return null;
  const missing = wrapSigned(wantedDeg - typedDeg, 360);
  return {
    offDeg: Math.abs(missing),
    side: sideOf(missing, fromDeg === null ? null : wrapSigned(wantedDeg - fromDeg, 360)),
    wantedInfidelity,
    typedInfidelity,
    within: typedInfidelity <= content.toleranceInfidelity,
  };
}

function sideOf(missing: number, wholeTurn: number | null): DialCost['side'] {
  if (wholeTurn === null || wholeTurn === 0) return missing > 0 ? 'below' : 'above';
  return Math.sign(missing) === Math.sign(wholeTurn) ? 'short of' : 'past';
}

/** The dials of a setting, in beam order: those of the solution that the version chose. */
export function wantedDials(content: VersionContent, settingIndex: number): readonly number[] {
  const target = content.targets[settingIndex];
  const solution = target?.solutions[target.chosenSolution];
  if (solution === undefined) throw new RangeError(`The version has no setting ${settingIndex + 1}.`);
  return solution.dialsDeg;
}
