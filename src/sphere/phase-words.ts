import {
  fullTurnSign,
  type PathPhases,
  pathPhases,
  type Phases,
  showPhases,
} from '../../shared/optics/phase';
import { type Radians, toDegrees } from '../../shared/optics/units';
import { formatAngle } from '../lib/format';
import { plateRetarder } from './plate-retarder';
import type { SphereInput, SpherePlate } from './scene';

/** The phases of the path against its start, in degrees as the lab writes them; null where none is defined. */
export interface PhaseDegrees {
  readonly totalDeg: number | null;
  readonly dynamicDeg: number;
  readonly geometricDeg: number | null;
}

export interface PhaseWords {
  readonly whole: PhaseDegrees;
  readonly afterPlate: readonly (PhaseDegrees & { readonly plate: string })[];
  /** Plates that make a full turn, and what the state's sign is then. */
  readonly turns: readonly string[];
  readonly text: string;
}

/** A calibrated retardance this near to whole turns is told as one: half of the last digit that is shown. */
const FULL_TURN_WITHIN_DEG = 0.05;

/** Total, dynamic and geometric phase of the drawn path, and the sign where something turns all the way round. */
export function phaseInWords({ start, plates, convention }: SphereInput): PhaseWords {
  const retarders = plates.map(plateRetarder);
  const phases = pathPhases(start, retarders);
  const shown = (one: Phases) => inDegrees(showPhases(one, convention));
  const whole = shown(phases);
  const turns = [...plates.flatMap(fullTurn), ...wholeTurn(plates, phases, fullTurnSign(retarders))];
  const written = convention.phase === 'kz-wt' ? 'kz − ωt' : 'ωt − kz';
  return {
    whole,
    afterPlate: phases.afterPlate.map((one, index) => ({ ...shown(one), plate: plates[index]?.name ?? '' })),
    turns,
    text: [
      `Phase behind the plates against the start, written ${written}: ${phaseList(whole)}.`,
      ...turns.map((turn) => `${turn}.`),
    ].join(' '),
  };
}

function inDegrees({ totalRad, dynamicRad, geometricRad }: Phases): PhaseDegrees {
  const degreesOf = (phase: Radians | null) => (phase === null ? null : toDegrees(phase));
  return {
    totalDeg: degreesOf(totalRad),
    dynamicDeg: toDegrees(dynamicRad),
    geometricDeg: degreesOf(geometricRad),
  };
}

function phaseList({ totalDeg, dynamicDeg, geometricDeg }: PhaseDegrees): string {
  if (totalDeg === null) {
    return (
      'total undefined, since this state is orthogonal to the start; ' +
      `dynamic ${formatAngle(dynamicDeg)}; geometric undefined with the total`
    );
  }
  return `total ${formatAngle(totalDeg)}, dynamic ${formatAngle(dynamicDeg)}, geometric ${formatAngle(geometricDeg)}`;
}

function fullTurn({ name, retardanceDeg }: SpherePlate): string[] {
  const turns = Math.round(Math.abs(retardanceDeg) / 360);
  if (turns === 0 || Math.abs(Math.abs(retardanceDeg) - 360 * turns) > FULL_TURN_WITHIN_DEG) return [];
  return [
    `${name} turns the sphere by ${formatAngle(360 * turns, 0)}: the state’s sign is ${signText(turns)}`,
  ];
}

/** Said for the whole path where more than one plate takes part; one alone has said it. */
function wholeTurn(
  plates: readonly SpherePlate[],
  { sign }: PathPhases,
  signForAll: 1 | -1 | null,
): string[] {
  if (plates.length < 2) return [];
  if (signForAll !== null) {
    return [`The plates together bring every state back with the sign ${signForAll > 0 ? '+1' : '−1'}`];
  }
  return sign === null ? [] : [`The path brings this state back with the sign ${sign > 0 ? '+1' : '−1'}`];
}

function signText(turns: number): string {
  return turns % 2 === 0 ? '+1' : '−1';
}
