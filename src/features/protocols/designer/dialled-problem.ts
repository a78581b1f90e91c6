import { type DialledState, evaluateDials } from '../../../../shared/optics/solve-target';
import type { Stokes } from '../../../../shared/optics/stokes';
import { fastAxisFromDial } from '../../../../shared/optics/dial';
import { degrees } from '../../../../shared/optics/units';
import { dialScaleOf, targetPlates } from '../../../../shared/protocol/solve-row';
import type { Plate } from '../../../../shared/schemas/cabinet';
import type { Bench } from '../../../../shared/schemas/benches';

interface Dialled {
  readonly bench: Bench;
  readonly input: Stokes;
  readonly target: Stokes;
  readonly dialsDeg: readonly number[];
}

/** What the bench makes with its dials standing so, and how far that is from the target. */
export function reachedState({ bench, input, target, dialsDeg }: Dialled): DialledState {
  return evaluateDials(
    {
      target,
      input,
      plates: targetPlates(bench.plates),
      polariserSigmaDeg: bench.polariserSigmaDeg,
      objective: 'least-expected-infidelity',
    },
    dialsDeg,
  );
}

/** Where the fast axis stands when the dial says this: what the table and the stage both show beside a dial. */
export function dialledAxisDeg(plate: Plate, dialDeg: number): number {
  return fastAxisFromDial(degrees(dialDeg), dialScaleOf(plate));
}
