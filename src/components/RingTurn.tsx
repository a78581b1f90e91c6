import type { DialScale } from '../../shared/optics/dial';
import { seenMove, type ViewedFrom } from './dial-words';
import { arc, arrowhead, polar, radial } from './polar';
import { numberAngle } from './ring-geometry';

interface RingTurnProps {
  readonly radius: number;
  readonly scale: Pick<DialScale, 'offsetDeg' | 'direction'>;
  readonly readingDeg: number;
  readonly toDeg: number;
  readonly viewedFrom: ViewedFrom;
  readonly indexAt: number;
}

/** Below this there is no room for an arc and its head between the wanted mark and the index. */
const roomDeg = 19;

/**
 * A round bead on the wanted mark and an arc with one arrowhead, from the bead to the index. The bead is round so that only one
 * end looks like an arrow. A small turn is drawn as a narrow gap is dimensioned: the arrow comes from outside and pushes the
 * bead towards the index. The sweep is the same number that the words are made of.
 */
export function RingTurn({ radius, scale, readingDeg, toDeg, viewedFrom, indexAt }: RingTurnProps) {
  const { turnDeg } = seenMove(readingDeg, toDeg, scale.direction, viewedFrom);
  if (turnDeg === 0) return null;
  const bead = numberAngle(toDeg, readingDeg, scale, indexAt, viewedFrom);
  const width = Math.max(1.8, radius / 38);
  const orbit = radius * 1.19;
  const beadRadius = Math.max(3.4, radius * 0.06);
  const head = Math.max(7, radius * 0.12);
  const inDegrees = (px: number): number => (px / orbit) * (180 / Math.PI);
  const sign = Math.sign(turnDeg);
  const headDeg = inDegrees(head);
  const small = Math.abs(turnDeg) < roomDeg;
  // Where the arrow's tip stands, and the arc behind its head.
  const tipAt = small ? bead - sign * inDegrees(beadRadius + width * 1.5) : bead + turnDeg - sign * 3;
  const from = small ? tipAt - sign * (headDeg + 15) : bead + sign * inDegrees(beadRadius);
  const sweep = small ? sign * 15.5 : tipAt - sign * headDeg - from;
  const [beadX, beadY] = polar(orbit, bead);
  return (
    <g fill="none" className="stroke-beam" strokeWidth={width} data-sweep={turnDeg}>
      <path d={radial(radius * 0.85, orbit - beadRadius, bead)} />
      {sweep * sign > 0.2 && <path d={arc(orbit, from, sweep)} />}
      <circle cx={beadX} cy={beadY} r={beadRadius} className="fill-paper" />
      <path
        d={arrowhead(polar(orbit, tipAt), tipAt + sign * (90 - headDeg / 2), head, head)}
        className="fill-beam"
        stroke="none"
      />
    </g>
  );
}
