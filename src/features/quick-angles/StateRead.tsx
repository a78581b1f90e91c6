import Complex from 'complex.js';
import {
  type Convention,
  ellipseOf,
  type JonesVector,
  letterOf,
  radians,
  type StateReading,
  toDegrees,
  translateJones,
} from '../../../shared/optics';
import { EllipseGlyph } from '../../components/EllipseGlyph';
import { Formula } from '../../components/Formula';

type Sense = 'clockwise' | 'counter-clockwise' | 'none';

/** a|H⟩ + b e^{iφ}|V⟩ with three figures, as the convention writes it; parts that vanish are left out. */
export function shortLatex(jones: JonesVector, convention: Convention): string {
  const { aRe, aIm, bRe, bIm } = translateJones(jones, convention);
  const amplitudeH = new Complex(aRe, aIm);
  const amplitudeV = new Complex(bRe, bIm);
  const a = amplitudeH.abs();
  const b = amplitudeV.abs();
  if (b < 5e-4) return '|H\\rangle';
  if (a < 5e-4) return '|V\\rangle';
  const phaseDeg = toDegrees(radians(amplitudeV.div(amplitudeH).arg()));
  const shown = phaseDeg.toFixed(1);
  const head = `${a.toFixed(3)}\\,|H\\rangle`;
  if (shown === '0.0' || shown === '-0.0') return `${head} + ${b.toFixed(3)}\\,|V\\rangle`;
  if (shown === '180.0' || shown === '-180.0') return `${head} - ${b.toFixed(3)}\\,|V\\rangle`;
  // e^{−i 90°}, as one says it: the sign stands before the i.
  const sign = shown.startsWith('-') ? '-' : '';
  return `${head} + ${b.toFixed(3)}\\,e^{${sign}i\\,${shown.replace('-', '')}^{\\circ}}|V\\rangle`;
}

/** A written state as it was read: its short form, its ellipse, and which way the field turns. */
export function StateRead(props: {
  readonly reading: Extract<StateReading, { ok: true }>;
  readonly convention: Convention;
}) {
  const { reading, convention } = props;
  const { azimuthRad, ellipticityRad } = ellipseOf(reading.stokes);
  const letter = letterOf(reading.stokes, convention);
  const sense: Sense = letter === null ? 'none' : reading.stokes[2] > 0 ? 'counter-clockwise' : 'clockwise';
  const words = letter === null ? 'linear' : `${sense} to the receiver`;
  return (
    <div className="flex flex-wrap items-center gap-x-5 gap-y-2">
      <EllipseGlyph
        radius={46}
        psiDeg={toDegrees(azimuthRad)}
        chiDeg={toDegrees(ellipticityRad)}
        sense={sense}
        framed
        className="shrink-0"
      />
      <div className="flex-1">
        <p className="text-body sm:text-[1.125rem]">
          <Formula latex={shortLatex(reading.jones, convention)} source={reading.canonical} />
        </p>
        <p className="text-ink-2 mt-1">
          {words}
          {letter !== null && `, a ${letter === 'L' ? 'left' : 'right'} hand in this convention`}
          {reading.normalised && `. Brought to length 1 from ${reading.norm.toPrecision(4)}`}
        </p>
      </div>
    </div>
  );
}
