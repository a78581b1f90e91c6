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

/** From so many plates on θ stands under its dial, or four of them would not fit a page of 1440 px. */
const manyPlates = 3;
const cell = 'py-1 pr-5';
const head = `h-8 ${cell} align-bottom font-words`;

/** Every target as it was frozen: the dials are those that a run dials. */
export function FrozenTargets({ content }: { readonly content: VersionContent }) {
  const { plates } = content.bench;
  const many = plates.length >= manyPlates;
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
            <th scope="col" className={`w-8 ${head}`}>
              <span className="sr-only">row</span>
            </th>
            <th scope="col" className={head}>
              label
            </th>
            <th scope="col" className={head}>
              {content.kind === 'prepare' ? 'target, after the plates' : 'unitary, of all the plates'}
            </th>
            {plates.map(({ id, name }) => (
              <th key={id} scope="col" className={`text-right ${head} ${many ? '' : 'whitespace-nowrap'}`}>
                <b className="text-ink">{name}</b> dial, θ
              </th>
            ))}
            <th scope="col" className={`pl-3 ${head}`}>
              expected 1 − F
            </th>
            <th scope="col" className={`text-right ${head}`}>
              as dialled, 1 − F
            </th>
            <th scope="col" className="h-8 py-1 text-right align-bottom font-words">
              solution
            </th>
          </tr>
        </thead>
        <tbody>
          {content.targets.map((target, place) => (
            <FrozenRow key={target.id} {...{ target, place, content, many }} />
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
  readonly many: boolean;
}

function FrozenRow({ target, place, content, many }: FrozenRowProps) {
  const solution = target.solutions[target.chosenSolution];
  const count = target.solutions.length;
  return (
    <tr className="h-[39px] border-b border-hair">
      <td className={`font-mono text-s text-ink-3 ${cell}`}>{place + 1}</td>
      <th scope="row" className={`text-left font-strong ${cell}`}>
        {target.label}
      </th>
      <td className={`${cell} [&_.whitespace-nowrap]:whitespace-normal`}>
        <WrittenFormula expression={target.expression} kind={content.kind} convention={content.convention} />
        {target.reach === 'nearest' && (
          <span className="ml-3 text-s text-ink-2">
            closest, out of reach by {target.shortfallDeg.toFixed(1)}°
          </span>
        )}
      </td>
      {content.bench.plates.map((plate, index) => (
        <td key={plate.id} className={`text-right whitespace-nowrap ${cell}`}>
          <span className="font-mono text-dial">
            {formatDial(solution?.dialsDeg[index] ?? 0, plate.mount.resolutionDeg)}
          </span>
          <span
            className={`text-right font-mono text-xs text-ink-2 ${many ? 'block' : 'inline-block min-w-15 pl-2'}`}
          >
            {formatTheta(fastAxisFromDial(degrees(solution?.dialsDeg[index] ?? 0), dialScaleOf(plate)))}
          </span>
        </td>
      ))}
      <td className={`pl-3 whitespace-nowrap ${cell}`}>
        {solution !== undefined && (
          <span className={`gap-x-3 ${many ? 'flex flex-wrap items-center' : 'inline-flex items-center'}`}>
            <FidelityChip
              infidelity={{
                value: solution.expectedInfidelity,
                low: solution.expectedLow,
                high: solution.expectedHigh,
              }}
              tolerance={content.toleranceInfidelity}
              kind="predicted"
              width={many ? 140 : 196}
            />
            <Scientific value={solution.expectedInfidelity} />
            <PredictedVerdict solution={solution} toleranceInfidelity={content.toleranceInfidelity} />
          </span>
        )}
      </td>
      <td className={`text-right whitespace-nowrap ${cell}`}>
        {solution !== undefined && <Scientific value={solution.dialledInfidelity} />}
      </td>
      <td className="py-1 text-right font-mono text-s whitespace-nowrap">
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
