import { useState } from 'react';
import { type BudgetProblem, type Contribution, whatIf } from '../../../../shared/optics/budget';
import type { Plate } from '../../../../shared/schemas/cabinet';
import { Scientific } from '../../../components/Scientific';
import { contributionName } from './contribution-words';

interface WhatIfProps {
  readonly problem: BudgetProblem;
  readonly contributions: readonly Contribution[];
  readonly plates: readonly Plate[];
  readonly expectedInfidelity: number;
}

const factors: readonly { readonly value: string; readonly label: string; readonly factor: number }[] = [
  { value: 'twice', label: 'twice as good', factor: 0.5 },
  { value: 'five', label: 'five times as good', factor: 0.2 },
  { value: 'exact', label: 'exact', factor: 0 },
  { value: 'half', label: 'half as good', factor: 2 },
];

/** What one better plate, mount or calibration would gain: the answer to "what should we buy?" */
export function WhatIf({ problem, contributions, plates, expectedInfidelity }: WhatIfProps) {
  const [place, setPlace] = useState(0);
  const [by, setBy] = useState('twice');
  const chosen = contributions[Math.min(place, contributions.length - 1)];
  const factor = factors.find(({ value }) => value === by)?.factor ?? 0.5;
  if (chosen === undefined || expectedInfidelity === 0) return null;
  const then = whatIf(problem, contributions.indexOf(chosen), factor);
  const gain = Math.round(100 * (1 - then / expectedInfidelity));
  return (
    <p className="mt-3 mb-0">
      <label>
        If{' '}
        <select
          className="fact-select"
          value={contributions.indexOf(chosen)}
          onChange={(event) => setPlace(Number(event.target.value))}
        >
          {contributions.map((contribution, index) =>
            contribution.sigma === 0 ? null : (
              <option key={contributionName(contribution, plates)} value={index}>
                {contributionName(contribution, plates)}
              </option>
            ),
          )}
        </select>
      </label>{' '}
      <label>
        were{' '}
        <select className="fact-select" value={by} onChange={(event) => setBy(event.target.value)}>
          {factors.map(({ value, label }) => (
            <option key={value} value={value}>
              {label}
            </option>
          ))}
        </select>
      </label>
      , the expected 1 − F would go from <Scientific value={expectedInfidelity} /> to{' '}
      <Scientific value={then} />
      {gain >= 0 ? `, ${gain} % less.` : `, ${-gain} % more.`}
    </p>
  );
}
