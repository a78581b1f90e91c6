import { fastAxisFromDial } from '../../../shared/optics/dial';
import { degrees } from '../../../shared/optics/units';
import { dialScaleOf } from '../../../shared/protocol/solving-plates';
import type { FrozenSolution, FrozenTarget, VersionContent } from '../../../shared/schemas/versions';
import { fidelityVerdict } from '../../components/fidelity-verdict';
import { FidelityChip } from '../../components/FidelityChip';
import { Scientific } from '../../components/Scientific';
import { HeldSign } from '../../components/SmallSigns';
import { WrittenFormula } from '../../components/WrittenFormula';
import { formatDial, formatTheta } from '../../lib/format';

/** Every target as it was frozen: the dials are those that a run dials. */
export function FrozenTargets({ content }: { readonly content: VersionContent }) {
  const { plates } = content.bench;
  return (
    <div
      className="relative overflow-x-auto"
      tabIndex={0}
      role="region"
      aria-label="Targets and dials, scrolls sideways"
    >
      <table className="w-full border-collapse">
        <thead>
          <tr className="border-b border-ink text-left text-s text-ink-2">
            <th scope="col" className="h-8 w-8">
              <span className="sr-only">row</span>
            </th>
            <th scope="col" className="w-16 font-words">
              label
            </th>
            <th scope="col" className="font-words">
              {content.kind === 'prepare' ? 'target, after the plates' : 'unitary, of all the plates'}
            </th>
            {plates.map(({ id, name }) => (
              <th key={id} scope="col" className="text-right font-words whitespace-nowrap">
                <b className="text-ink">{name}</b> dial, θ
              </th>
            ))}
            <th scope="col" className="pl-8 font-words">
              expected 1 − F
            </th>
            <th scope="col" className="text-right font-words">
              as dialled, 1 − F
            </th>
            <th scope="col" className="text-right font-words">
              solution
            </th>
          </tr>
        </thead>
        <tbody>
          {content.targets.map((target, place) => (
            <FrozenRow key={target.id} {...{ target, place, content }} />
          ))}
        </tbody>
      </table>
    </div>
  );
}

interface FrozenRowProps {
  readonly target: FrozenTarget;
  readonly place: number;
  readonly content: VersionContent;
}

function FrozenRow({ target, place, content }: FrozenRowProps) {
  const solution = target.solutions[target.chosenSolution];
  const count = target.solutions.length;
  return (
    <tr className="h-[39px] border-b border-hair">
      <td className="font-mono text-s text-ink-3">{place + 1}</td>
      <th scope="row" className="text-left font-strong">
        {target.label}
      </th>
      <td>
        <WrittenFormula expression={target.expression} kind={content.kind} convention={content.convention} />
        {target.reach === 'nearest' && (
          <span className="ml-3 text-s text-ink-2">
            closest, out of reach by {target.shortfallDeg.toFixed(1)}°
          </span>
        )}
      </td>
      {content.bench.plates.map((plate, index) => (
        <td key={plate.id} className="text-right whitespace-nowrap">
          <span className="font-mono text-dial">
            {formatDial(solution?.dialsDeg[index] ?? 0, plate.mount.resolutionDeg)}
          </span>
          <span className="inline-block min-w-15 pl-2 text-right font-mono text-xs text-ink-2">
            {formatTheta(fastAxisFromDial(degrees(solution?.dialsDeg[index] ?? 0), dialScaleOf(plate)))}
          </span>
        </td>
      ))}
      <td className="pl-8 whitespace-nowrap">
        {solution !== undefined && (
          <span className="inline-flex items-center gap-3">
            <FidelityChip
              infidelity={{
                value: solution.expectedInfidelity,
                low: solution.expectedLow,
                high: solution.expectedHigh,
              }}
              tolerance={content.toleranceInfidelity}
              kind="predicted"
            />
            <Scientific value={solution.expectedInfidelity} />
            <PredictedVerdict solution={solution} toleranceInfidelity={content.toleranceInfidelity} />
          </span>
        )}
      </td>
      <td className="text-right whitespace-nowrap">
        {solution !== undefined && <Scientific value={solution.dialledInfidelity} />}
      </td>
      <td className="text-right font-mono text-s whitespace-nowrap">
        {target.held && <HeldSign />}{' '}
        {target.reach === 'nearest' && count === 1 ? 'closest' : `${target.chosenSolution + 1} of ${count}`}
      </td>
    </tr>
  );
}

interface PredictedVerdictProps {
  readonly solution: FrozenSolution;
  readonly toleranceInfidelity: number;
}

/** In words wherever it isn't within. */
function PredictedVerdict({ solution, toleranceInfidelity }: PredictedVerdictProps) {
  const { expectedInfidelity: value, expectedLow: low, expectedHigh: high } = solution;
  const verdict = fidelityVerdict({ value, low, high }, toleranceInfidelity);
  if (verdict === 'within') return null;
  return (
    <span className={verdict === 'not within' ? 'font-strong text-fault' : 'text-ink-2'}>{verdict}</span>
  );
}
