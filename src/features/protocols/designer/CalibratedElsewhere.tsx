import { type Goal, unitaryInfidelity } from '../../../../shared/optics/goal';
import { stackQuaternion, type Retarder } from '../../../../shared/optics/retarder';
import { platesAtDials, statesBehind } from '../../../../shared/optics/solve-target';
import { infidelityBetween } from '../../../../shared/optics/stokes';
import { degrees, toRadians } from '../../../../shared/optics/units';
import { rowGoal } from '../../../../shared/protocol/solve-row';
import { targetPlates, usedRetardance } from '../../../../shared/protocol/solving-plates';
import type { Bench } from '../../../../shared/schemas/benches';
import { Scientific } from '../../../components/Scientific';
import { GapText } from '../../../lib/GapText';
import { elsewhereSentence, usedElsewhere } from '../../benches';
import type { Looked } from './use-looked';

/** 1 − F between what these dials make and what they would if every plate retarded as it was measured. */
function leftOutCosts(bench: Bench, goal: Goal, dialsDeg: readonly number[]): number {
  const used = platesAtDials(targetPlates(bench.plates, bench), dialsDeg);
  const measured = used.map((retarder, k): Retarder => ({
    ...retarder,
    retardanceRad: toRadians(degrees(bench.plates[k]?.calibration.retardanceDeg ?? 0)),
  }));
  if (goal.kind === 'apply') return unitaryInfidelity(stackQuaternion(used), stackQuaternion(measured));
  const behind = (plates: readonly Retarder[]) => statesBehind(goal.input, plates).at(-1) ?? goal.input;
  return infidelityBetween(behind(used), behind(measured));
}

interface CalibratedElsewhereProps {
  readonly bench: Bench;
  /** The selected row; null while none is solved. */
  readonly looked: Looked | null;
}

/** Says which plates are used away from where they were measured, what is made of that, and how much it moves. */
export function CalibratedElsewhere({ bench, looked }: CalibratedElsewhereProps) {
  const elsewhere = bench.plates
    .map((plate) => ({ plate, used: usedRetardance(plate, bench) }))
    .filter(({ plate, used }) => usedElsewhere(plate, used, bench));
  if (elsewhere.length === 0) return null;
  const unmodelled = elsewhere.some(({ used }) => used.source === 'no-model');
  const costs =
    looked === null
      ? 0
      : leftOutCosts(looked.bench, rowGoal(looked.view.reading, looked.input), looked.view.solution.dialsDeg);
  return (
    <div className={`mb-2 text-s ${unmodelled ? 'font-strong text-fault' : 'text-ink-2'}`}>
      {elsewhere.map(({ plate, used }) => (
        <p key={plate.id} className="m-0">
          <GapText text={elsewhereSentence(plate, used, bench)} />
        </p>
      ))}
      {looked !== null && costs > 1e-9 && (
        <p className="m-0">
          With the values as measured, {looked.target.label} would be another light by 1 − F{' '}
          <Scientific value={costs} />.
        </p>
      )}
    </div>
  );
}
