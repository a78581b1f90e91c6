import { useState } from 'react';
import type { BudgetProblem } from '../../../../shared/optics/budget';
import type { MonteCarloSummary } from '../../../../shared/optics/monte-carlo';
import { BeamWorking } from '../../../components/BeamState';
import { Button } from '../../../components/Button';
import { NumberField } from '../../../components/NumberField';
import { Scientific } from '../../../components/Scientific';
import { SelectField } from '../../../components/SelectField';
import { TextButton } from '../../../components/TextLink';
import { readTypedNumber } from '../../../lib/forms';
import { useStudy } from '../../../workers/use-study';
import { InfidelityHistogram } from './InfidelityHistogram';
import type { SettingSolution } from './row-view';

const drawCounts = ['10000', '100000', '1000000'] as const;
const gap = '\u00a0';

interface MonteCarloPanelProps {
  readonly label: string;
  readonly problem: BudgetProblem;
  /** First order, to hold the draws against. */
  readonly solution: SettingSolution;
  readonly toleranceInfidelity: number;
}

/** The same budget drawn instead of linearised: every σ at once, each draw propagated exactly, from a stated seed. */
export function MonteCarloPanel({ label, problem, solution, toleranceInfidelity }: MonteCarloPanelProps) {
  const [draws, setDraws] = useState<string>('100000');
  const [seed, setSeed] = useState('1');
  const { study, start, cancel } = useStudy('monte-carlo');
  const seedNumber = readTypedNumber(seed);
  const seedFault =
    Number.isSafeInteger(seedNumber) && seedNumber >= 0 ? undefined : 'Write a whole number from 0.';
  const run = () => {
    if (seedFault === undefined) {
      start({
        kind: 'monte-carlo',
        problem,
        draws: Number(draws),
        seed: seedNumber,
        toleranceInfidelity,
      });
    }
  };
  return (
    <section aria-label={`Drawn budget of ${label}`} className="mt-4">
      <div className="flex flex-wrap items-start gap-x-6 gap-y-3">
        <SelectField
          label="draws"
          className="w-32"
          value={draws}
          options={drawCounts.map((value) => ({
            value,
            label: Number(value).toLocaleString('en').replaceAll(',', gap),
          }))}
          onChange={(event) => setDraws(event.target.value)}
        />
        <NumberField
          label="seed"
          className="w-28"
          value={seed}
          fault={seedFault}
          onChange={(event) => setSeed(event.target.value)}
        />
        <div className="pt-6">
          {study.state === 'working' ? (
            <Button onClick={cancel}>Cancel the drawing</Button>
          ) : (
            <Button onClick={run}>Draw the budget</Button>
          )}
        </div>
      </div>
      {study.state === 'working' && (
        <BeamWorking doing="Drawing" unit="per cent" done={Math.round(study.share * 100)} total={100} />
      )}
      {study.state === 'failed' && (
        <p role="alert" className="mt-2 mb-0 font-strong text-fault">
          {study.sentence}
        </p>
      )}
      {study.state === 'done' && (
        <Drawn {...study.result} solution={solution} toleranceInfidelity={toleranceInfidelity} />
      )}
    </section>
  );
}

interface DrawnProps {
  readonly summary: MonteCarloSummary;
  readonly shareWithin: number;
  readonly solution: SettingSolution;
  readonly toleranceInfidelity: number;
}

function Drawn({ summary, shareWithin, solution, toleranceInfidelity }: DrawnProps) {
  const [asTable, setAsTable] = useState(false);
  const { mean, standardError, median, low, high, largest } = summary;
  const apart = Math.abs(mean - solution.expectedInfidelity);
  const agrees = apart <= 4 * standardError;
  return (
    <div role="status" className="mt-3">
      <dl className="drawn-numbers">
        {(
          [
            ['mean', mean],
            ['median', median],
            ['5 % point', low],
            ['95 % point', high],
            ['largest', largest],
          ] as const
        ).map(([name, value]) => (
          <div key={name}>
            <dt className="text-s text-ink-2">{name}</dt>
            <dd className="m-0">
              <Scientific value={value} />
            </dd>
          </div>
        ))}
      </dl>
      <p className="mt-2 mb-0 text-s">
        {agrees
          ? 'First order gives the same mean within four standard errors of the draws'
          : 'First order is not enough here: its mean is further away than four standard errors of the draws'}{' '}
        (<Scientific value={solution.expectedInfidelity} /> against <Scientific value={mean} />, standard
        error <Scientific value={standardError} />
        ).
      </p>
      <InfidelityHistogram
        {...{ summary, shareWithin }}
        tolerance={toleranceInfidelity}
        firstOrder={{ low: solution.expectedLow, high: solution.expectedHigh }}
        asTable={asTable}
      />
      <TextButton className="text-s" aria-expanded={asTable} onClick={() => setAsTable(!asTable)}>
        {asTable ? 'Hide the table of bins' : 'The bins as a table'}
      </TextButton>
    </div>
  );
}
