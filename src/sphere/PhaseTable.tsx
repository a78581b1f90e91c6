import { formatAngle } from '../lib/format';
import type { PhaseWords } from './phase-words';

/** The phases behind each plate, against the light before the first. */
export function PhaseTable({ phase }: { readonly phase: PhaseWords }) {
  return (
    <table className="path-in-words">
      <caption>
        Phase against the start, in degrees; what both components gain alike is left out. On a flag the
        hairline is in phase with the start, and the pennant turned clockwise from it, seen from outside, is
        later by that angle. An open ring is no defined phase.
      </caption>
      <thead>
        <tr>
          <th scope="col">behind</th>
          <th scope="col">total</th>
          <th scope="col">dynamic</th>
          <th scope="col">geometric</th>
        </tr>
      </thead>
      <tbody>
        {phase.afterPlate.map(({ plate, totalDeg, dynamicDeg, geometricDeg }, index) => (
          <tr key={index}>
            <th scope="row">{plate}</th>
            <PhaseCell phaseDeg={totalDeg} />
            <PhaseCell phaseDeg={dynamicDeg} />
            <PhaseCell phaseDeg={geometricDeg} />
          </tr>
        ))}
      </tbody>
    </table>
  );
}

function PhaseCell({ phaseDeg }: { readonly phaseDeg: number | null }) {
  return phaseDeg === null ? (
    <td>undefined: orthogonal to the start</td>
  ) : (
    <td className="path-number">{formatAngle(phaseDeg)}</td>
  );
}
