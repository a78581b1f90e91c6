import type { DialScale } from '../../../shared/optics/dial';
import { seenMove, type ViewedFrom } from '../../components/dial-words';
import { arc, arrowhead, polar, radial } from '../../components/polar';
import { numberAngle } from '../../components/ring-geometry';

/** Below this there is no room for an arc and its head between the wanted mark and the index. */
const roomDeg = 19;
/** The mount's index is at the top. */
const indexAt = 90;

interface SmallTurnProps {
  /** Of the housing, in px. */
  readonly radius: number;
  readonly scale: Pick<DialScale, 'offsetDeg' | 'direction'>;
  readonly readingDeg: number;
  readonly toDeg: number;
  readonly viewedFrom: ViewedFrom;
}

/** Whether a turn is too small for its arrow to stand between the wanted mark and the index. */
export function isSmallTurn(
  { direction }: Pick<DialScale, 'direction'>,
  readingDeg: number,
  toDeg: number,
): boolean {
  return Math.abs(seenMove(readingDeg, toDeg, direction, 'receiver').turnDeg) < roomDeg;
}

/**
 * A small turn as a narrow gap is dimensioned: the bead is on the wanted mark, and the arrow comes from outside and pushes it
 * towards the index. It is laid over the ring and has its frame.
 */
export function SmallTurn({ radius, scale, readingDeg, toDeg, viewedFrom }: SmallTurnProps) {
  const { turnDeg } = seenMove(readingDeg, toDeg, scale.direction, viewedFrom);
  if (turnDeg === 0) return null;
  const bead = numberAngle(toDeg, readingDeg, scale, indexAt, viewedFrom);
  const sign = Math.sign(turnDeg);
  const orbit = radius * 1.19;
  const width = Math.max(1.8, radius / 38);
  const beadRadius = Math.max(3.4, radius * 0.06);
  const head = Math.max(7, radius * 0.12);
  const inDegrees = (px: number): number => (px / orbit) * (180 / Math.PI);
  const tipAt = bead - sign * inDegrees(beadRadius + width * 1.5);
  const headDeg = inDegrees(head);
  const [beadX, beadY] = polar(orbit, bead);
  return (
    <svg
      viewBox={`${-radius} ${-radius} ${2 * radius} ${2 * radius}`}
      width={2 * radius}
      height={2 * radius}
      className="bench-small-turn"
      aria-hidden="true"
    >
      <g fill="none" className="stroke-beam" strokeWidth={width}>
        <path d={radial(radius * 0.85, orbit - beadRadius, bead)} />
        <path d={arc(orbit, tipAt - sign * (headDeg + 15), sign * 15.5)} />
        <circle cx={beadX} cy={beadY} r={beadRadius} className="fill-paper" />
        <path
          d={arrowhead(polar(orbit, tipAt), tipAt + sign * (90 - headDeg / 2), head, head)}
          className="fill-beam"
          stroke="none"
        />
      </g>
    </svg>
  );
}
