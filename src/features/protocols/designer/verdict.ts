import { fidelityVerdict, type Verdict } from '../../../components/fidelity-verdict';
import type { SettingSolution } from './row-view';

/** How a prediction stands to the tolerance, by its 5 % and 95 % points. */
export function toleranceVerdict(
  { expectedInfidelity, expectedLow, expectedHigh }: SettingSolution,
  toleranceInfidelity: number,
): Verdict {
  return fidelityVerdict(
    { value: expectedInfidelity, low: expectedLow, high: expectedHigh },
    toleranceInfidelity,
  );
}
