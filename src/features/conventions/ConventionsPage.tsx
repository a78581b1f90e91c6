import { useDeferredValue, useMemo } from 'react';
import { DEFAULT_CONVENTION } from '../../../shared/optics';
import { BeamEmpty } from '../../components/BeamState';
import { Formula } from '../../components/Formula';
import { ExpressionField } from '../../components/ExpressionField';
import { SegmentedChoice } from '../../components/SegmentedChoice';
import { TextButton, TextLink } from '../../components/TextLink';
import type { WrittenKind } from './address';
import { Colleague } from './Colleague';
import { compareWritten } from './compare-written';
import type { Chosen } from './compared-rows';
import { Comparison } from './Comparison';
import { ConventionSelect } from './ConventionSelect';
import { LightFigure } from './LightFigure';
import { SetSources } from './SetSources';
import { UnitaryFigure } from './UnitaryFigure';
import { useOwnConvention } from './use-own-convention';
import { useWritten } from './use-written';
import './conventions.css';

const kinds: readonly { readonly value: WrittenKind; readonly label: string }[] = [
  { value: 'state', label: 'a state' },
  { value: 'unitary', label: 'a unitary' },
];

const helpWords: Record<WrittenKind, string> = {
  state:
    'A name (H V D A L R), a sum like (H + i V)/sqrt(2), a column [1, i], bloch, ellipse, linear, or stokes, which may be partly polarised.',
  unitary:
    'A gate (X Y Z S T hadamard), plates like qwp(45deg) hwp(10deg), rotate, zyz, matrix [[a, b], [c, d]].',
};

/** What an empty field offers to begin with. */
const offered: Record<WrittenKind, string> = { state: '(H + i V)/sqrt(2)', unitary: 'qwp(45deg)' };

const strangers: Chosen = { convention: DEFAULT_CONVENTION, setId: null };

/** One state or unitary as every convention writes it, beside what the light really does. Public, and nothing is kept. */
export function Component() {
  const { own, settled } = useOwnConvention();
  const ownChoice: Chosen = own === null ? strangers : { convention: own.convention, setId: null };
  const { kind, source, unknown, setKind, setSource, setChosen, ...written } = useWritten(
    settled ? ownChoice : null,
  );
  const chosen = written.chosen ?? ownChoice;
  const read = useDeferredValue(source);
  const compared = useMemo(() => compareWritten(kind, read, chosen, own), [kind, read, chosen, own]);
  return (
    <div className="space-y-8 pt-4 pb-10">
      <title>Conventions side by side · Quarterturn</title>
      <header className="mb-4 flex flex-wrap items-baseline justify-between gap-x-6 gap-y-1">
        <h1 className="text-title">Conventions side by side</h1>
        <p className="text-ink-2">the address holds what is typed, so it can be sent</p>
      </header>
      <div className="grid grid-cols-1 gap-x-14 gap-y-8 lg:grid-cols-[23rem_minmax(0,1fr)]">
        <div className="space-y-5">
          <SegmentedChoice label="what is compared" value={kind} onChange={setKind} segments={kinds} />
          <ExpressionField
            label={kind}
            help={helpWords[kind]}
            value={source}
            fault={compared.kind === 'unreadable' && read === source ? compared.error : undefined}
            onChange={setSource}
          />
          <ConventionSelect
            chosen={chosen}
            own={own}
            onChange={setChosen}
            fault={
              unknown === null
                ? undefined
                : `The address names a convention that is not known here, “${unknown}”. Choose the one that is meant.`
            }
          />
          {(compared.kind === 'state' || compared.kind === 'unitary') && (
            <p className="overflow-x-auto overflow-y-hidden text-[1.125rem]">
              <Formula latex={compared.latex} source={read} />
              {compared.size !== null && (
                <span className="text-s text-ink-2 block">
                  {compared.kind === 'state'
                    ? 'Brought to length 1 from '
                    : 'Written this many times larger: '}
                  {compared.size.toPrecision(4)}
                </span>
              )}
            </p>
          )}
          <p className="text-s">
            <TextLink to="/how-numbers-are-made">What is inside</TextLink>
          </p>
        </div>
        {compared.kind === 'state' && <LightFigure stokes={compared.stokes} />}
        {compared.kind === 'unitary' && <UnitaryFigure unitary={compared.unitary} />}
        {compared.kind === 'unreadable' && (
          <p className="text-ink-2 lg:pt-7">It stands here as soon as it can be read.</p>
        )}
        {compared.kind === 'empty' && (
          <BeamEmpty title={`No ${kind} yet`} className="lg:pt-7">
            Write one, or begin with{' '}
            <TextButton onClick={() => setSource(offered[kind])}>{offered[kind]}</TextButton>
          </BeamEmpty>
        )}
      </div>
      {(compared.kind === 'state' || compared.kind === 'unitary') && (
        <Comparison written={compared} source={read} />
      )}
      <Colleague />
      <SetSources />
    </div>
  );
}
