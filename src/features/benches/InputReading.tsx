import { type Convention, letterOf, parseState } from '../../../shared/optics';
import type { Stokes } from '../../../shared/optics';
import { Formula } from '../../components/Formula';

function senseWords(stokes: Stokes, convention: Convention): string {
  const letter = letterOf(stokes, convention);
  if (letter === null) return 'linear';
  return `${stokes[2] > 0 ? 'counter-clockwise' : 'clockwise'} to the receiver, ${letter} here`;
}

/** The sentence that a form shows for an expression that cannot be read; null when it can. */
export function inputFault(expression: string, convention: Convention): string | null {
  const reading = parseState(expression, convention);
  return reading.ok ? null : `Column ${reading.error.column}: ${reading.error.message}`;
}

/** How the lab's convention reads an input state, as it is typed. */
export function InputReading({
  expression,
  convention,
}: {
  readonly expression: string;
  readonly convention: Convention;
}) {
  const reading = parseState(expression, convention);
  if (!reading.ok) return null;
  return (
    <span>
      input <Formula latex={reading.latex} source={reading.canonical} />,{' '}
      {senseWords(reading.stokes, convention)}
      {reading.normalised ? `; brought to length 1 from ${reading.norm.toPrecision(4)}` : ''}
    </span>
  );
}
