import type { DialScale } from '../../shared/optics/dial';
import { type ViewedFrom } from './dial-words';
import { classNames } from './class-names';
import { numberStepDeg, seenAngle, tickStepDeg } from './ring-geometry';
import { RingGlass } from './RingGlass';
import { RingScale } from './RingScale';
import { RingTurn } from './RingTurn';
import { arrowhead, polar, radial } from './polar';
import { useUnwrappedAngle } from './use-unwrapped-angle';

export type RingState = 'standing' | 'to-turn' | 'dialled' | 'stays' | 'unsettled' | 'empty';
export type PlateKind = 'half' | 'quarter' | 'other';

export interface RingDialProps {
  /** Of the housing, in px. */
  readonly radius: number;
  readonly kind: PlateKind;
  /** How this mount is engraved. */
  readonly scale: Pick<DialScale, 'offsetDeg' | 'direction'>;
  readonly readingDeg: number;
  /** Where it has to go; draws bead, arc and arrowhead. */
  readonly toDeg?: number | undefined;
  readonly state?: RingState | undefined;
  /** Everything is drawn as the receiver sees it unless someone stands on the source side. */
  readonly viewedFrom?: ViewedFrom | undefined;
  /** Where the mount's index is, in table degrees; the top unless the mount's is elsewhere. */
  readonly indexAt?: number | undefined;
  /** Numbers may be thinned for rings that only stay. */
  readonly numbersEveryDeg?: 30 | 90 | null | undefined;
  /** The name for a screen reader; without it the ring is decoration beside words that say the same. */
  readonly label?: string | undefined;
  readonly className?: string | undefined;
}

/** Room around the housing for index, arc and bead, as a share of the radius. */
const ringMargin = 0.36;

/**
 * A mount as the hand meets it: the housing with its fixed index, the graduated ring turned so that the present reading is under
 * it, and the plate's axes at their true table angle in the glass.
 */
export function RingDial({
  radius,
  kind,
  scale,
  readingDeg,
  toDeg,
  state = toDeg === undefined ? 'standing' : 'to-turn',
  viewedFrom = 'receiver',
  indexAt = 90,
  numbersEveryDeg = numberStepDeg(radius),
  label,
  className,
}: RingDialProps) {
  const extent = radius * (1 + ringMargin);
  const size = 2 * extent;
  // The mount's own turn: 0 when the fast axis is along H.
  const turnDeg = useUnwrappedAngle(scale.direction * (readingDeg - scale.offsetDeg));
  const quiet = state === 'stays' || state === 'dialled';
  const line = quiet ? 'stroke-ink-3' : 'stroke-ink';
  const index = seenAngle(indexAt, viewedFrom);
  const seenTurn = viewedFrom === 'source' ? -turnDeg : turnDeg;
  const accessible = label === undefined ? { 'aria-hidden': true } : { role: 'img', 'aria-label': label };
  const fine = Math.max(0.6, Math.min(1, radius / 80));
  const frame = {
    viewBox: `${-extent} ${-extent} ${size} ${size}`,
    width: size,
    height: size,
    className: classNames('overflow-visible', className),
  };

  if (state === 'empty') {
    return (
      <svg {...frame} {...accessible}>
        <g fill="none" className="stroke-ink" strokeWidth="1.1" strokeDasharray="3.5 3.5">
          <circle r={radius * 0.96} />
          <circle r={radius * 0.63} />
        </g>
      </svg>
    );
  }
  return (
    <svg {...frame} {...accessible}>
      <circle r={radius} className={classNames('fill-paper', line)} strokeWidth={1.2} />
      <circle r={radius * 0.955} fill="none" className={line} strokeWidth={fine} />
      <RingScale
        {...{ radius, scale, viewedFrom, indexAt, numbersEveryDeg, seenTurn, quiet }}
        stepDeg={tickStepDeg(radius)}
      />
      <RingGlass {...{ radius, kind, seenTurn, viewedFrom, quiet, state }} />
      {/* The index belongs to the housing and never moves. */}
      <path
        d={radial(radius * 0.8, radius * 1.0, index)}
        strokeWidth={Math.max(1.3, radius / 70)}
        className={line}
      />
      <path
        d={arrowhead(
          polar(radius * 1.01, index),
          index + 180,
          Math.max(5, radius * 0.1),
          Math.max(5, radius * 0.1),
        )}
        className={quiet ? 'fill-ink-3' : state === 'to-turn' ? 'fill-act' : 'fill-ink'}
      />
      {toDeg !== undefined && state === 'to-turn' && (
        <RingTurn {...{ radius, scale, readingDeg, toDeg, viewedFrom, indexAt }} />
      )}
    </svg>
  );
}
