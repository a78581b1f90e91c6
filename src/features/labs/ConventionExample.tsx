import { type Convention, letterOf, parseState, showStokes } from '../../../shared/optics';
import { Formula } from '../../components/Formula';
import { formatChange } from '../../lib/format';

const source = '(H + i V)/sqrt(2)';

/** How one written state is read under a convention: which way its field really turns, and what the lab calls that. */
export function ConventionExample({ convention }: { readonly convention: Convention }) {
  const reading = parseState(source, convention);
  if (!reading.ok) return null;
  const turns = reading.stokes[2] > 0 ? 'counter-clockwise' : 'clockwise';
  const { s3 } = showStokes(reading.stokes, convention);
  return (
    <p className="mt-4" role="status">
      Under this, <Formula latex={reading.latex} source={source} /> turns <b>{turns}</b> as the receiver sees
      it, is called <b>{letterOf(reading.stokes, convention)}</b>, and its S3 is written{' '}
      <b>{formatChange(s3, 0)}</b>.
    </p>
  );
}
