import {
  type Convention,
  CONVENTION_SETS,
  type JonesVector,
  jonesToStokes,
  letterOf,
  showStokes,
  translateJones,
} from '../../../shared/optics';
import { formatChange } from '../../lib/format';
import { flagWords, writtenComplex } from '../conventions';

/** One way of writing a state down. */
export interface LightRow {
  readonly id: string;
  readonly name: string;
  readonly flags: string;
  /** "0.832, 0.399+0.386i": the Jones vector, a first. */
  readonly jones: string;
  readonly hand: 'left' | 'right' | 'linear';
  /** The shown S3, signed, three decimals. */
  readonly s3: string;
}

/** How one convention writes a state that is given in the canonical frame. */
export function lightRow(id: string, name: string, jones: JonesVector, convention: Convention): LightRow {
  const stokes = jonesToStokes(jones);
  const shown = translateJones(jones, convention);
  const letter = letterOf(stokes, convention);
  return {
    id,
    name,
    flags: flagWords(convention),
    jones: `${writtenComplex(shown.aRe, shown.aIm)}, ${writtenComplex(shown.bRe, shown.bIm)}`,
    hand: letter === null ? 'linear' : letter === 'L' ? 'left' : 'right',
    s3: formatChange(showStokes(stokes, convention).s3, 3),
  };
}

/** The same light as each published set writes it, after one's own way. */
export function lightRows(jones: JonesVector, own: Convention): readonly LightRow[] {
  return [
    lightRow('own', 'Yours', jones, own),
    ...CONVENTION_SETS.map(({ id, name, convention }) => lightRow(id, name, jones, convention)),
  ];
}
