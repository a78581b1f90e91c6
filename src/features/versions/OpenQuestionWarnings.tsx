import { useMemo } from 'react';
import { type OpenQuestionRisk, openQuestionRisks } from '../../../shared/protocol/open-question-risk';
import type { OpenQuestion } from '../../../shared/schemas/calibrations';
import type { VersionContent } from '../../../shared/schemas/versions';
import { Scientific } from '../../components/Scientific';

const left: Readonly<Record<OpenQuestion, (plate: string) => string>> = {
  axis: (plate) => `Nobody has settled which axis of ${plate} is the fast one.`,
  branch: (plate) => `Nobody has settled whether the retardance of ${plate} is as written or 360° less it.`,
  blind: (plate) => `The retardance of ${plate} was measured where a scan is blind to it.`,
};

function lostWords({ lostCount }: OpenQuestionRisk, count: number): string {
  if (lostCount === count) return count === 1 ? 'the one target is' : 'every target is';
  return `${lostCount} of ${count} targets ${lostCount === 1 ? 'is' : 'are'}`;
}

/** List items: each open question that a result depends on, and what the other answer would cost. */
export function OpenQuestionRisks({
  risks,
  count,
}: {
  readonly risks: readonly OpenQuestionRisk[];
  /** Of all rows. */
  readonly count: number;
}) {
  return risks.map((risk) => (
    <li key={risk.plateName} className="font-strong text-fault">
      {left[risk.question](risk.plateName)} If it is the other way, {lostWords(risk, count)} out of tolerance:{' '}
      {risk.worst.label} at 1 − F <Scientific value={risk.worst.infidelity} />.
    </li>
  ));
}

/** The same of a version as it is kept. */
export function OpenQuestionWarnings({ content }: { readonly content: VersionContent }) {
  const risks = useMemo(() => openQuestionRisks(content), [content]);
  return <OpenQuestionRisks risks={risks} count={content.targets.length} />;
}
