import type { ViewedFrom } from './dial-words';
import { arrowhead } from './polar';
import { seenAngle } from './ring-geometry';

interface EllipseGlyphProps {
  /** Half the length of a linear state's bar, in px. */
  readonly radius: number;
  /** The long axis in table degrees. */
  readonly psiDeg: number;
  /** Ellipticity, −45 to 45; its sign is not drawn, `sense` is. */
  readonly chiDeg: number;
  /** As the receiver sees it. */
  readonly sense: 'clockwise' | 'counter-clockwise' | 'none';
  /** Filled as light: the state that comes out. */
  readonly lit?: boolean;
  /** Disc, cross-hair and long axis around it. */
  readonly framed?: boolean;
  readonly viewedFrom?: ViewedFrom | undefined;
  readonly label?: string | undefined;
  readonly className?: string | undefined;
}

// Below this the two arms of the ellipse would run into each other and an arrowhead would point nowhere.
const flatDeg = 1.2;

/** The ellipse that the field draws at one place, with the hand of its turn; a linear state is a bar. */
export function EllipseGlyph({
  radius,
  psiDeg,
  chiDeg,
  sense,
  lit = false,
  framed = false,
  viewedFrom = 'receiver',
  label,
  className,
}: EllipseGlyphProps) {
  const frame = framed ? radius * 1.3 : radius + 6;
  const chi = Math.abs(chiDeg);
  const long = radius * Math.cos((chi * Math.PI) / 180);
  const short = radius * Math.sin((chi * Math.PI) / 180);
  const linear = chi < flatDeg || sense === 'none';
  const seenSense =
    viewedFrom === 'receiver' || sense === 'none'
      ? sense
      : sense === 'clockwise'
        ? 'counter-clockwise'
        : 'clockwise';
  const turn = seenAngle(psiDeg, viewedFrom);
  const heavy = lit ? 2.6 : Math.max(1.4, radius / 22);
  const head = Math.max(6, radius * 0.2);
  // Heads sit at the two ends of the long axis; the field moves across it there.
  const heading = seenSense === 'counter-clockwise' ? 90 : -90;
  const accessible = label === undefined ? { 'aria-hidden': true } : { role: 'img', 'aria-label': label };
  return (
    <svg
      {...accessible}
      viewBox={`${-frame} ${-frame} ${2 * frame} ${2 * frame}`}
      width={2 * frame}
      height={2 * frame}
      className={className}
    >
      {framed && (
        <>
          <circle r={frame - 1} className="fill-glass stroke-hair" strokeWidth="1" />
          <path
            d={`M${-frame} 0H${frame}M0 ${-frame}V${frame}`}
            className="stroke-rule"
            strokeWidth="0.9"
            strokeDasharray="1 4"
          />
        </>
      )}
      <g transform={`rotate(${-turn})`}>
        {framed && !linear && (
          <path
            d={`M${-frame * 0.96} 0H${frame * 0.96}`}
            className="stroke-ink"
            strokeWidth="1"
            strokeDasharray="5 4"
          />
        )}
        {linear ? (
          <g fill="none" className="stroke-ink">
            <path d={`M${-radius} 0H${radius}`} strokeWidth={Math.max(1.8, radius / 14)} />
            <path d={`M${-radius} -4V4M${radius} -4V4`} strokeWidth="1.4" />
          </g>
        ) : (
          <>
            <ellipse
              rx={long}
              ry={short}
              strokeWidth={heavy}
              className={lit ? 'fill-lit stroke-ink' : 'fill-none stroke-ink'}
            />
            <path
              d={
                arrowhead([long, heading > 0 ? -head * 0.45 : head * 0.45], heading, head, head * 0.8) +
                arrowhead([-long, heading > 0 ? head * 0.45 : -head * 0.45], heading + 180, head, head * 0.8)
              }
              className="fill-ink"
            />
          </>
        )}
      </g>
    </svg>
  );
}
