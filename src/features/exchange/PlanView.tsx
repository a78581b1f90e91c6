import type { ImportPlan } from '../../../shared/cabinet-document';
import { Button } from '../../components/Button';
import { SectionHead } from '../../components/SectionHead';
import { planRows } from './plan-rows';
import { counted, importVerb, planSentences, unchangedWords } from './plan-words';
import { PlanTable } from './PlanTable';

interface PlanViewProps {
  readonly plan: ImportPlan;
  readonly onImport: () => void;
  readonly onLeave: () => void;
}

/** What a dry run found: counts, what can't be taken, what would change, and the one button. */
export function PlanView({ plan, onImport, onLeave }: PlanViewProps) {
  const changesNothing = plan.changes.length === 0;
  const unchanged = unchangedWords(plan);
  return (
    <>
      <p className="mt-2 max-w-[80ch]">
        {changesNothing
          ? 'The file would change nothing: what can be taken of it is in the cabinet already.'
          : planSentences(plan).join(' ')}
      </p>
      {plan.refused.length > 0 && (
        <section aria-labelledby="refused" className="mt-5">
          <SectionHead id="refused" level={3} size="small" note="the rest can still be imported">
            {counted(plan.refused.length, 'entry', 'entries')} that can’t be taken
          </SectionHead>
          <ul className="mt-1">
            {plan.refused.map(({ what, name, reason }, index) => (
              <li key={index} className="border-b border-hair py-2">
                <span className="font-strong">{name}</span>{' '}
                <span className="font-strong text-fault">{what} not taken.</span> {reason}
              </li>
            ))}
          </ul>
        </section>
      )}
      {!changesNothing && (
        <div className="mt-5">
          <PlanTable rows={planRows(plan)} />
        </div>
      )}
      {unchanged !== '' && (
        <details className="mt-4">
          <summary className="min-h-6 cursor-pointer">As it is here already</summary>
          <p className="mt-1 text-ink-2">{unchanged} of the file are in the cabinet just so.</p>
        </details>
      )}
      <p className="mt-5 flex flex-wrap gap-4">
        {!changesNothing && (
          <Button kind="filled" onClick={onImport}>
            {importVerb(plan)}
          </Button>
        )}
        <Button onClick={onLeave}>{changesNothing ? 'Choose another file' : 'Leave it as it was'}</Button>
      </p>
    </>
  );
}
