import { formatAngle } from '../lib/format';
import { missInWords, pathInWords, type StateWords } from './path-words';
import type { SphereInput } from './scene';

/** The path as a table: what the sphere shows, for whoever can't see it or wants the numbers. */
export function PathInWords({ input }: { readonly input: SphereInput }) {
  const words = pathInWords(input);
  return (
    <table className="path-in-words">
      <caption>
        The path of the light on the sphere. Turns are in degrees of the sphere, seen from outside above the
        plate’s fast axis; axes are in degrees of the table.
      </caption>
      <thead>
        <tr>
          <th scope="col">plate</th>
          <th scope="col">fast axis</th>
          <th scope="col">turn</th>
          <th scope="col">
            state after it, with S<sub>1</sub>, S<sub>2</sub>, S<sub>3</sub>
          </th>
        </tr>
      </thead>
      <tbody>
        <tr>
          <th scope="row">before the plates</th>
          <td>—</td>
          <td>—</td>
          <StateCell state={words.start} />
        </tr>
        {words.turns.map((turn, index) => (
          <tr key={index}>
            <th scope="row">{turn.plate}</th>
            <td className="path-number">{formatAngle(turn.axisDeg, 2)}</td>
            <td>
              {formatAngle(turn.amountDeg)} {turn.sense}
              {turn.moves ? '' : '; the light lies along the axis and stays'}
            </td>
            <StateCell state={turn.after} />
          </tr>
        ))}
        {words.target !== undefined && (
          <tr>
            <th scope="row">target {words.target.label}</th>
            <td>—</td>
            <td>
              {words.turns.length === 0
                ? '—'
                : `the end is ${missInWords(words.target.label, words.target.missDeg)}`}
            </td>
            <StateCell state={words.target} />
          </tr>
        )}
      </tbody>
    </table>
  );
}

function StateCell({ state }: { readonly state: StateWords }) {
  return (
    <td>
      {state.text}
      <span className="path-stokes">{state.shown.map(formatStokes).join(', ')}</span>
    </td>
  );
}

function formatStokes(value: number): string {
  const text = Math.abs(value).toFixed(4);
  return value < 0 && Number(text) !== 0 ? `−${text}` : text;
}
