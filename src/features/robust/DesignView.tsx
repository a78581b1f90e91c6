import { type Ref, useMemo, useState } from 'react';
import type { Convention } from '../../../shared/optics';
import { CopyText } from '../../components/CopyText';
import { NumberField } from '../../components/NumberField';
import { Scientific } from '../../components/Scientific';
import { SectionHead } from '../../components/SectionHead';
import { TextButton } from '../../components/TextLink';
import { GapText } from '../../lib/GapText';
import { infidelityAscii, withTrueMinus } from '../../lib/format';
import { readTypedNumber } from '../../lib/forms';
import { CurveTable } from './CurveTable';
import { type Design, dialledInfidelity, infidelitiesAt } from './design';
import { type DesignCurves, drawnCurves, heldOver, powerOf } from './design-curves';
import { copiedText, errorName, errorWords, plainWords, ratioWords } from './design-words';
import { DesignSphere } from './DesignSphere';
import { wholePower } from './error-power';
import { InfidelityPlot } from './InfidelityPlot';

interface DesignViewProps {
  readonly design: Design;
  readonly convention: Convention;
  /** How far from the goal all these plates stay; 0 when it is reached. */
  readonly shortfallDeg: number;
  readonly tolerance: string;
  readonly onTolerance: (text: string) => void;
  readonly headRef: Ref<HTMLDivElement>;
}

const FIRST_TOLERANCE = 1e-3;

/** One composite: its 1 − F against the error beside the plain setting's, and the way of the light through it. */
export function DesignView(props: DesignViewProps) {
  const { design, convention, shortfallDeg, tolerance: typedTolerance, onTolerance, headRef } = props;
  const [error, setError] = useState(0);
  const [asTable, setAsTable] = useState(false);
  const curves = useMemo(() => drawnCurves(design), [design]);
  const typed = readTypedNumber(typedTolerance);
  const readable = typed > 0 && typed < 1;
  const tolerance = readable ? typed : FIRST_TOLERANCE;
  const here = Math.max(-2 * design.width, Math.min(2 * design.width, error));
  const infidelity = infidelitiesAt(design.goal, design, [here])[0] ?? 1;
  const dialled = useMemo(() => dialledInfidelity(design), [design]);
  return (
    <div className="mt-8 grid grid-cols-1 gap-x-12 gap-y-8 desk:grid-cols-[minmax(0,1fr)_28.5rem]">
      <section aria-labelledby="design-head" className="min-w-0">
        <div ref={headRef} tabIndex={-1}>
          <SectionHead id="design-head" note={`for ${design.goalWords}`}>
            {design.title}, and the plain solution
          </SectionHead>
        </div>
        <p className="mt-2">
          <PowerSentence design={design} />{' '}
          <HeldSentence curves={curves} design={design} tolerance={tolerance} />
        </p>
        <p className="mt-1 text-s text-ink-2">
          Average 1 − F over ±<GapText text={errorWords(design.width, design.error)} />:{' '}
          <Scientific value={design.robustness.averageInfidelity} mono={false} />, plain{' '}
          <Scientific value={design.plain.robustness.averageInfidelity} mono={false} />;{' '}
          <GapText
            text={ratioWords(design.robustness.averageInfidelity, design.plain.robustness.averageInfidelity)}
          />
          . Plain is {plainWords(design.plain, shortfallDeg)}.
          {dialled !== null && (
            <>
              {' '}
              Rounded to the dials, 1 − F at no error is <Scientific value={dialled} mono={false} />.
            </>
          )}
        </p>
        <div className="mt-4 flex flex-wrap items-end justify-between gap-x-6 gap-y-2">
          <NumberField
            label="tolerance, 1 − F"
            className="w-36"
            value={typedTolerance}
            fault={
              readable ? undefined : 'Write a number above 0 and below 1, like 1e-3, which stands until then.'
            }
            onChange={(event) => onTolerance(event.target.value)}
          />
          <TextButton className="mb-2" aria-expanded={asTable} onClick={() => setAsTable(!asTable)}>
            {asTable ? 'as a plot' : 'as a table'}
          </TextButton>
        </div>
        <div className="mt-3">
          {asTable ? (
            <CurveTable design={design} tolerance={tolerance} />
          ) : (
            <InfidelityPlot
              design={design}
              curves={curves}
              tolerance={tolerance}
              here={{ error: here, infidelity }}
              words={plotWords(design, tolerance)}
              onLookAt={setError}
            />
          )}
        </div>
        <CopyText
          text={copiedText(design, convention)}
          action="Copy the angles"
          name="the setting as text"
          copied="Copied, one plate a line."
        />
      </section>
      <section aria-labelledby="sphere-head" className="min-w-0">
        <SectionHead id="sphere-head" className="mb-3">
          The way of the light
        </SectionHead>
        <DesignSphere
          design={design}
          convention={convention}
          error={here}
          infidelity={infidelity}
          onLookAt={setError}
        />
      </section>
    </div>
  );
}

function plotWords(design: Design, tolerance: number): string {
  const { robustness, plain, error, width } = design;
  const words = (value: number) => withTrueMinus(infidelityAscii(value));
  return (
    `Plot of 1 − F against the ${errorName(error)}, twice as far as ±${errorWords(width, error)}. Average over that range: ` +
    `composite ${words(robustness.averageInfidelity)}, plain ${words(plain.robustness.averageInfidelity)}; tolerance ${words(tolerance)}.`
  );
}

/** The measured order, of both. */
function PowerSentence({ design }: { readonly design: Design }) {
  const found = useMemo(() => powerOf(design, 'composite'), [design]);
  const plain = useMemo(() => powerOf(design, 'plain'), [design]);
  const whole = found === null ? null : wholePower(found.power);
  const plainWhole = plain === null ? null : wholePower(plain.power);
  if (!design.meetsGoal) {
    return (
      <>
        Even at no error 1 − F is <Scientific value={design.robustness.infidelityAtZero} mono={false} />: this
        setting misses the goal and only keeps 1 − F low over the range.
      </>
    );
  }
  if (found === null) return <>Over this range 1 − F stays nothing but rounding.</>;
  return (
    <>
      1 − F falls as{' '}
      {whole === null ? (
        'no whole power of the error'
      ) : (
        <>
          ε<sup>{whole}</sup>
        </>
      )}{' '}
      towards no error (measured {found.power.toFixed(2)} between{' '}
      <GapText text={errorWords(found.near, design.error)} /> and{' '}
      <GapText text={errorWords(2 * found.near, design.error)} />)
      {plainWhole !== null && (
        <>
          , the plain solution as ε<sup>{plainWhole}</sup>
        </>
      )}
      .
    </>
  );
}

interface HeldSentenceProps {
  readonly design: Design;
  readonly curves: DesignCurves;
  readonly tolerance: number;
}

/** Over which errors the tolerance holds. */
function HeldSentence({ design, curves, tolerance }: HeldSentenceProps) {
  const composite = heldOver(curves, 'composite', tolerance);
  const plain = heldOver(curves, 'plain', tolerance);
  const range = (held: typeof composite) =>
    held === null
      ? 'not even at no error'
      : held.from <= (curves.errors[0] ?? 0) && held.to >= (curves.errors.at(-1) ?? 0)
        ? `over all of the ±${errorWords(2 * design.width, design.error)} drawn`
        : `from ${errorWords(Number(held.from.toPrecision(2)), design.error)} to ${errorWords(Number(held.to.toPrecision(2)), design.error)}`;
  return (
    <>
      It is within <Scientific value={tolerance} mono={false} /> <GapText text={range(composite)} />, the
      plain one <GapText text={range(plain)} />.
    </>
  );
}
