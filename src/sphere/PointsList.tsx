import type { Convention } from '../../shared/optics/convention';
import { pointsInWords } from './point-words';
import type { SpherePointInput } from './scene';

/** The states of a set as a list: the first ones, and how many more. */
export function PointsList({
  points,
  convention,
}: {
  readonly points: readonly SpherePointInput[];
  readonly convention: Convention;
}) {
  const { named, more } = pointsInWords(points, convention);
  return (
    <ul className="sphere-points">
      {named.map(({ label, text }, index) => (
        <li key={index}>
          <b>{label}</b> {text}
        </li>
      ))}
      {more > 0 && <li>and {more} more</li>}
    </ul>
  );
}
