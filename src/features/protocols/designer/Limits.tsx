import type { Contribution } from '../../../../shared/optics/budget';
import type { Plate } from '../../../../shared/schemas/cabinet';
import { GapText } from '../../../lib/GapText';
import { contributionName, sigmaText } from './contribution-words';
import type { SettingSolution } from './row-view';

interface LimitsProps {
  readonly label: string;
  readonly solution: SettingSolution;
  /** Of that setting, largest first. */
  readonly contributions: readonly Contribution[];
  readonly plates: readonly Plate[];
}

function gainText(contribution: Contribution, plates: readonly Plate[]): string {
  const gain = Math.round(contribution.gainIfHalved * 100);
  const name = contributionName(contribution, plates);
  const half = contribution.unit === 'ratio' ? `Half of ${name}` : `Half the σ of ${name}`;
  return `${half} would gain ${gain} %.`;
}

/** A setting that makes its target leaves far less than this of its own. */
const negligible = 1e-12;

interface LimitRowProps {
  readonly name: string;
  readonly sigma: string;
  readonly share: number;
  readonly largest: number;
}

function LimitRow({ name, sigma, share, largest }: LimitRowProps) {
  return (
    <tr>
      <th scope="row" className="text-left text-s font-words">
        {name}
      </th>
      <td className="text-right font-mono text-s text-ink-2">
        <GapText text={sigma} />
      </td>
      <td>
        <span className="limits-share">
          <svg aria-hidden="true" className="limits-bar" viewBox="0 0 100 10" preserveAspectRatio="none">
            <rect width={largest > 0 ? (100 * share) / largest : 0} height="10" fill="var(--ink)" />
          </svg>
          <span className="font-mono text-s">{Math.round(share * 100)} %</span>
        </span>
      </td>
    </tr>
  );
}

/** What makes the selected target worse than perfect, largest first, and what an improvement would gain. */
export function Limits({ label, solution, contributions, plates }: LimitsProps) {
  const uncertain = contributions.filter(({ sigma }) => sigma > 0);
  const [first] = uncertain;
  // What no σ explains: the target lies out of reach, and the setting is the closest there is.
  const ownShare = solution.infidelity > negligible ? solution.infidelity / solution.expectedInfidelity : 0;
  const largest = Math.max(ownShare, first?.share ?? 0);
  return (
    <section aria-label={`What limits ${label}`} className="limits">
      <div>
        <h2 className="m-0 text-body font-section">What limits {label}</h2>
        <p className="mt-1 mb-0 text-s text-ink-2">
          {first === undefined || first.infidelity === 0
            ? 'Nothing that has a σ: the plates and dials are taken as exact.'
            : gainText(first, plates)}
        </p>
      </div>
      <table className="limits-table">
        <thead className="sr-only">
          <tr>
            <th scope="col">parameter</th>
            <th scope="col">σ</th>
            <th scope="col">share of the expected 1 − F</th>
          </tr>
        </thead>
        <tbody>
          {ownShare > 0 && (
            <LimitRow name="out of reach by itself" sigma="" share={ownShare} largest={largest} />
          )}
          {uncertain.map((contribution) => (
            <LimitRow
              key={`${contribution.kind} ${String(contribution.plate)}`}
              name={contributionName(contribution, plates)}
              sigma={sigmaText(contribution)}
              share={contribution.share}
              largest={largest}
            />
          ))}
        </tbody>
      </table>
    </section>
  );
}
