import type { ViewedFrom } from './dial-words';
import { arrowhead, polar, radial } from './polar';
import { seenAngle } from './ring-geometry';
import type { PlateKind, RingState } from './RingDial';

interface RingGlassProps {
  readonly radius: number;
  readonly kind: PlateKind;
  readonly seenTurn: number;
  readonly viewedFrom: ViewedFrom;
  readonly quiet: boolean;
  readonly state: RingState;
}

/** What is in the glass: H and V as dotted cross-hair, the fast axis with two arrowheads, the slow axis as short dots. */
export function RingGlass({ radius, kind, seenTurn, viewedFrom, quiet, state }: RingGlassProps) {
  const glass = radius * 0.63;
  const line = quiet ? 'stroke-ink-3' : 'stroke-ink';
  const fill = quiet ? 'fill-ink-3' : 'fill-ink';
  const heavy = Math.max(1.6, Math.min(2.6, radius / 40));
  const rest = seenAngle(0, viewedFrom);
  const head = Math.max(5.5, radius * 0.11);
  const fast = rest + seenTurn;
  const [signX, signY] = polar(glass * 0.6, fast - 55);
  return (
    <>
      <circle r={glass} className={`fill-glass ${line}`} strokeWidth={1.3} />
      <circle r={glass * 0.95} fill="none" className={line} strokeWidth={0.5} />
      <path
        d={`M${-glass * 0.93} 0H${glass * 0.93}M0 ${-glass * 0.93}V${glass * 0.93}`}
        className="stroke-rule"
        strokeWidth="0.9"
        strokeDasharray="1 4"
      />
      {state === 'unsettled' ? (
        <g className="motion-ring" style={{ transform: `rotate(${-seenTurn}deg)` }}>
          {/* Both axes, since either may be the fast one. */}
          <path
            d={`${radial(glass * 0.34, glass, rest)}${radial(glass * 0.34, glass, rest + 180)}`}
            className={line}
            strokeWidth={heavy}
          />
          <path
            d={`${radial(glass * 0.34, glass, rest + 90)}${radial(glass * 0.34, glass, rest + 270)}`}
            className={line}
            strokeWidth={heavy}
            strokeDasharray="4 3.5"
          />
        </g>
      ) : (
        <g className="motion-ring" style={{ transform: `rotate(${-seenTurn}deg)` }}>
          <path
            d={`${radial(0, glass * 0.34, rest + 90)}${radial(0, glass * 0.34, rest + 270)}`}
            className={line}
            strokeWidth="1"
            strokeDasharray="2.4 2.2"
          />
          <path
            d={`${radial(0, glass * 0.95, rest)}${radial(0, glass * 0.95, rest + 180)}`}
            className={line}
            strokeWidth={heavy}
          />
          <path
            d={
              arrowhead(polar(glass * 1.03, rest), rest, head, head) +
              arrowhead(polar(glass * 1.03, rest + 180), rest + 180, head, head)
            }
            className={fill}
          />
        </g>
      )}
      {state === 'unsettled' ? (
        <text
          textAnchor="middle"
          dominantBaseline="central"
          fontSize={glass * 0.58}
          className={`${fill} font-mono font-section`}
        >
          ?
        </text>
      ) : (
        kind !== 'other' && (
          <text
            x={signX}
            y={signY}
            textAnchor="middle"
            dominantBaseline="central"
            fontSize={Math.max(11, glass * 0.3)}
            className={`${fill} font-strong`}
          >
            {kind === 'half' ? '½' : '¼'}
          </text>
        )
      )}
    </>
  );
}
