import { useMemo, useState } from 'react';
import { classNames } from '../../components/class-names';
import { SectionHead } from '../../components/SectionHead';
import { ExpressionField } from '../../components/ExpressionField';
import { SegmentedChoice } from '../../components/SegmentedChoice';
import { AgreementSign } from './AgreementSign';
import { eliminationSentences, judgedWords } from './colleague-words';
import { flagWords } from './flag-words';
import { type Elimination, type Evidence, whichConvention } from './which-convention';

const unknown = { value: 'unknown', label: 'not known' } as const;
const rotations = [
  { value: 'counter-clockwise', label: 'counter-clockwise' },
  { value: 'clockwise', label: 'clockwise' },
  unknown,
] as const;
const letters = [{ value: 'L', label: 'left' }, { value: 'R', label: 'right' }, unknown] as const;
const signs = [{ value: '+', label: '+' }, { value: '−', label: '−' }, unknown] as const;

const nothingKnown: Evidence = { source: '', rotation: null, letter: null, s3: null };

function Result({ found, evidence }: { readonly found: Elimination; readonly evidence: Evidence }) {
  if (found.kind === 'linear') {
    return <p>That is linear light, which every convention writes alike. Take one that turns.</p>;
  }
  if (found.kind === 'unreadable')
    return <p className="text-ink-2">It stands here as soon as it can be read.</p>;
  if (found.kind === 'nothing') {
    return (
      <p className="text-ink-2">
        Two facts about one light are enough to begin: its Jones vector as they write it, which way it was
        seen to turn, what they call it, the sign of their S3.
      </p>
    );
  }
  const [head, ...more] = eliminationSentences(found);
  const sets = [...found.sets].sort((one, other) => Number(other.fits) - Number(one.fits));
  return (
    <>
      <p>
        <b>{head}</b> {more.join(' ')}
      </p>
      <ul className="mt-3 list-none p-0">
        {sets.map((judged) => (
          <li
            key={judged.set.id}
            className="border-hair grid grid-cols-1 gap-x-6 border-t py-2 sm:grid-cols-[minmax(0,1fr)_minmax(0,1fr)]"
          >
            <span>
              <span className={judged.fits ? 'font-strong' : 'text-ink-3'}>{judged.set.name}</span>
              <span className={classNames('text-s block', judged.fits ? 'text-ink-2' : 'text-ink-3')}>
                {flagWords(judged.asConvention)}
              </span>
            </span>
            <span className={classNames('text-s flex items-start gap-1.5', !judged.fits && 'text-ink-3')}>
              <AgreementSign agrees={judged.fits} />
              <span>{judgedWords(judged, evidence)}</span>
            </span>
          </li>
        ))}
      </ul>
    </>
  );
}

/** From what a colleague wrote and saw of one light: which published sets they can be using. */
export function Colleague() {
  const [evidence, setEvidence] = useState(nothingKnown);
  const found = useMemo(() => whichConvention(evidence), [evidence]);
  return (
    <section aria-labelledby="colleague">
      <SectionHead id="colleague">Which convention does your colleague use?</SectionHead>
      <div className="mt-3 grid grid-cols-1 gap-x-14 gap-y-6 lg:grid-cols-[23rem_minmax(0,1fr)]">
        <div className="space-y-4">
          <ExpressionField
            label="the Jones vector of one light, as they write it"
            help="A column like [1, i], or a sum like (H - i V)/sqrt(2). Leave it empty if you do not have it."
            value={evidence.source}
            fault={found.kind === 'unreadable' ? found.error : undefined}
            onChange={(source) => setEvidence({ ...evidence, source })}
          />
          <SegmentedChoice
            label="for the receiver its field turns"
            segments={rotations}
            value={evidence.rotation ?? 'unknown'}
            onChange={(value) => setEvidence({ ...evidence, rotation: value === 'unknown' ? null : value })}
          />
          <SegmentedChoice
            label="they call it"
            segments={letters}
            value={evidence.letter ?? 'unknown'}
            onChange={(value) => setEvidence({ ...evidence, letter: value === 'unknown' ? null : value })}
          />
          <SegmentedChoice
            label="their S3 of it has the sign"
            segments={signs}
            value={evidence.s3 ?? 'unknown'}
            onChange={(value) => setEvidence({ ...evidence, s3: value === 'unknown' ? null : value })}
          />
        </div>
        <div aria-live="polite">
          <Result found={found} evidence={evidence} />
        </div>
      </div>
    </section>
  );
}
