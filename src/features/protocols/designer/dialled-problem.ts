import { type DialledState, evaluateDials } from '../../../../shared/optics/solve-target';
import type { Stokes } from '../../../../shared/optics/stokes';
import { targetPlates } from '../../../../shared/protocol/solve-row';
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
