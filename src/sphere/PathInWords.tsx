import { formatAngle } from '../lib/format';
import { ImagesTable } from './ImagesTable';
import { missInWords, pathInWords, type PathWords } from './path-words';
import { PhaseTable } from './PhaseTable';
import { PointsList } from './PointsList';
import type { SphereInput } from './scene';
import { StateCell } from './StateCell';

/** What the sphere shows in words and tables, for whoever can't see it or wants the numbers. */
export function PathInWords({
  input,
  words = pathInWords(input),
}: {
  readonly input: SphereInput;
  readonly words?: PathWords;
}) {
  const points = input.points ?? [];
  // Without plates and target there is no path to tell, where something else is shown.
  const hasPath = input.plates.length > 0 || input.target !== undefined;
  const hasMore = points.length > 0 || words.images.length > 0 || words.reach !== undefined;
  return (
    <>
      {(hasPath || !hasMore) && <PathTable words={words} />}
      {words.phase !== undefined && <PhaseTable phase={words.phase} />}
      {words.images.length > 0 && <ImagesTable images={words.images} />}
      {words.reach !== undefined && <p className="sphere-words">{words.reach.text}</p>}
      {points.length > 0 && <PointsList points={points} convention={input.convention} />}
    </>
  );
}

function PathTable({ words }: { readonly words: PathWords }) {
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
