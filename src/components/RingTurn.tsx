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

/**
 * A round bead on the wanted mark and an arc from it to the index with one arrowhead. The bead is round so that only one end
 * looks like an arrow. The sweep is the same number that the words are made of.
 */
export function RingTurn({ radius, scale, readingDeg, toDeg, viewedFrom, indexAt }: RingTurnProps) {
  const { turnDeg } = seenMove(readingDeg, toDeg, scale.direction, viewedFrom);
  if (turnDeg === 0) return null;
  const bead = numberAngle(toDeg, readingDeg, scale, indexAt, viewedFrom);
  const width = Math.max(1.8, radius / 38);
  const orbit = radius * 1.19;
  const beadRadius = Math.max(3.4, radius * 0.06);
  const head = Math.max(7, radius * 0.12);
  // The arc stops short of the index by the head's length, at most by half its own.
  const headDeg = Math.min((head / orbit) * (180 / Math.PI), Math.abs(turnDeg) / 2);
  const sign = Math.sign(turnDeg);
  const gapDeg = Math.min((beadRadius / orbit) * (180 / Math.PI), Math.abs(turnDeg) / 2);
  const tipAt = bead + turnDeg - sign * Math.min(3, Math.abs(turnDeg) / 8);
  const sweep = tipAt - sign * headDeg - (bead + sign * gapDeg);
  return (
    <g fill="none" className="stroke-beam" strokeWidth={width} data-sweep={turnDeg}>
      <path d={radial(radius * 0.85, orbit - beadRadius, bead)} />
      {Math.abs(sweep) > 0.2 && <path d={arc(orbit, bead + sign * gapDeg, sweep)} />}
      <circle cx={polar(orbit, bead)[0]} cy={polar(orbit, bead)[1]} r={beadRadius} className="fill-paper" />
      <path
        d={arrowhead(polar(orbit, tipAt), tipAt + sign * (90 - headDeg / 2), head, head)}
        className="fill-beam"
        stroke="none"
      />
    </g>
  );
}
