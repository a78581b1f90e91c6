import { type Stokes, stokesLength } from '../../../shared/optics';
import { SectionHead } from '../../components/SectionHead';
import { EllipseInTime } from './EllipseInTime';
import { FieldTable } from './FieldTable';
import { FieldTraces } from './FieldTraces';
import { anchorSentence } from './light-words';
import { UNPOLARISED } from './written-parts';

// Less than this short of 1 is rounding in what was typed.
const FULLY_POLARISED_WITHIN = 5e-4;

/** "Its degree of polarisation is 0.625; …" for what is not fully polarised, else null. */
export function degreeSentence(stokes: Stokes): string | null {
  const degree = stokesLength(stokes);
  if (degree < UNPOLARISED) return 'Its degree of polarisation is 0.';
  if (degree > 1 - FULLY_POLARISED_WITHIN) return null;
  return `Its degree of polarisation is ${degree.toFixed(3)}; field, ellipse, hand and Jones vector are those of its polarised part, brought to length 1; Stokes and Bloch vectors are those of the whole, and as long as this degree.`;
}

/** The light itself, before anyone names it: which way its field goes, drawn against time and in numbers. */
export function LightFigure({ stokes }: { readonly stokes: Stokes }) {
  const degree = degreeSentence(stokes);
  return (
    <section aria-labelledby="the-light">
      <SectionHead id="the-light" note="what everyone sees alike">
        The light itself
      </SectionHead>
      <p className="mt-2 text-[1.125rem] leading-6">
        <b>{anchorSentence(stokes)}</b> No convention has a say in that.
      </p>
      {degree !== null && <p className="text-ink-2 mt-1">{degree}</p>}
      {stokesLength(stokes) >= UNPOLARISED && (
        <div className="light-figure mt-4">
          <EllipseInTime stokes={stokes} />
          <FieldTraces stokes={stokes} />
          <FieldTable stokes={stokes} />
        </div>
      )}
    </section>
  );
}
