import { memo, useMemo, useState } from 'react';
import { errorBudget } from '../../../../shared/optics/budget';
import type { Convention } from '../../../../shared/optics/convention';
import type { Bench } from '../../../../shared/schemas/benches';
import type { DraftContent } from '../../../../shared/schemas/protocols';
import { TextButton } from '../../../components/TextLink';
import { rowBudget } from './dialled-problem';
import { Limits } from './Limits';
import { MonteCarloPanel } from './MonteCarloPanel';
import type { RowView } from './row-view';
import { WhatIf } from './WhatIf';

interface BudgetSectionProps {
  readonly label: string;
  readonly bench: Bench;
  readonly content: DraftContent;
  readonly convention: Convention;
  readonly view: Extract<RowView, { status: 'solved' }>;
}

/** What limits the selected row: to first order as ranked bars, what an improvement would gain, and drawn. */
export const BudgetSection = memo(function BudgetSection({
  label,
  bench,
  content,
  convention,
  view,
}: BudgetSectionProps) {
  const { kind, objective, presentDialsDeg } = content;
  const { reading, solution } = view;
  const [drawing, setDrawing] = useState(false);
  const problem = useMemo(
    () => rowBudget(bench, convention, { kind, objective, presentDialsDeg }, reading, solution.fastAxesDeg),
    [bench, convention, kind, objective, presentDialsDeg, reading, solution.fastAxesDeg],
  );
  const contributions = useMemo(
    () => (problem === null ? [] : errorBudget(problem).contributions),
    [problem],
  );
  if (problem === null) return null;
  return (
    <>
      <Limits {...{ label, solution, contributions }} plates={bench.plates} />
      <WhatIf
        problem={problem}
        contributions={contributions}
        plates={bench.plates}
        expectedInfidelity={solution.expectedInfidelity}
      />
      <p className="mt-2 mb-0 text-s">
        <TextButton aria-expanded={drawing} onClick={() => setDrawing(!drawing)}>
          {drawing ? 'Put the drawn budget away' : 'Draw the budget by Monte Carlo'}
        </TextButton>
      </p>
      {drawing && (
        <MonteCarloPanel
          // Draws of another problem would stand under this one's name.
          key={`${content.toleranceInfidelity} ${JSON.stringify(problem)}`}
          label={label}
          problem={problem}
          solution={solution}
          toleranceInfidelity={content.toleranceInfidelity}
        />
      )}
    </>
  );
});
