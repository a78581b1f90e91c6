import { classNames } from './class-names';
import { arc, polar, polarText, radial } from './polar';

interface AgeRingProps {
  /** Of the ring in px: 33 in the tray, 11 as a sign. */
  readonly radius?: number;
  /** The fast axis at its table angle, as the mount stands; null while nobody knows it. */
  readonly fastAxisDeg: number | null;
  /** No mount holds the plate; unless it is given, so where the axis is not known. */
  readonly dashed?: boolean;
  /** Days since the calibration and days until it is due again; null when it was never calibrated. */
  readonly ageDays: number | null;
  readonly dueDays: number;
  /** Nobody has settled which axis is the fast one. */
  readonly unsettled?: boolean;
  /** Open in the tray. */
  readonly lit?: boolean;
  readonly label?: string | undefined;
  readonly className?: string | undefined;
}

/** In words what the arc shows: `27 days of 90`, `14 days over`, `never calibrated`. */
export function ageWords(ageDays: number | null, dueDays: number): string {
  if (ageDays === null) return 'never calibrated';
  const over = ageDays - dueDays;
  if (over > 0) return over === 1 ? '1 day over' : `${over} days over`;
  return ageDays === 1 ? `1 day of ${dueDays}` : `${ageDays} days of ${dueDays}`;
}

/** A plate in the tray: a small mount with the age of its calibration as an arc, where a full quarter turn means due. */
export function AgeRing({
  radius = 33,
  fastAxisDeg,
  dashed = fastAxisDeg === null,
  ageDays,
  dueDays,
  unsettled = false,
  lit = false,
  label,
  className,
}: AgeRingProps) {
  const small = radius < 20;
  const orbit = radius * (small ? 1.5 : 1.25);
  const reach = orbit + Math.max(5, radius * 0.17);
  const glass = radius * 0.62;
  const share = ageDays === null ? 0 : Math.min(1, Math.max(0, ageDays / dueDays));
  const over = ageDays !== null && ageDays > dueDays;
  const width = Math.max(2.2, radius * 0.09);
  const edge = lit ? 'stroke-on-lit' : 'stroke-ink';
  const tickStep = small ? 30 : 22.5;
  const dash = dashed ? { strokeDasharray: '2.4 2.4' } : {};
  const accessible = label === undefined ? { 'aria-hidden': true } : { role: 'img', 'aria-label': label };
  const [markX, markY] = polar(radius * 0.82, 55);
  return (
    <svg
      {...accessible}
      viewBox={`${-reach} ${-reach} ${2 * reach} ${2 * reach}`}
      width={2 * reach}
      height={2 * reach}
      className={classNames('overflow-visible', className)}
    >
      <circle
        r={radius}
        className={classNames('motion-beam', lit ? 'fill-lit stroke-ink' : 'fill-glass stroke-ink')}
        strokeWidth={lit ? 2 : 1.1}
        {...dash}
      />
      <path
        d={Array.from({ length: Math.round(360 / tickStep) }, (_, index) =>
          radial(radius * (index % 4 === 0 ? 0.86 : 0.91), radius, index * tickStep),
        ).join('')}
        strokeWidth="0.8"
        className={edge}
      />
      <circle r={glass} fill="none" className={edge} strokeWidth={small ? 0.8 : 0.9} />
      {fastAxisDeg !== null && (
        <g className="motion-ring" style={{ transform: `rotate(${-fastAxisDeg}deg)` }}>
          <path d={`M${-glass} 0H${glass}`} strokeWidth={Math.max(1.3, radius * 0.045)} className={edge} />
        </g>
      )}
      <g fill="none">
        <path d={arc(orbit, 90, -90)} strokeWidth={width} className="stroke-hair" />
        {share > 0 && <path d={arc(orbit, 90, -90 * share)} strokeWidth={width} className="stroke-ink" />}
        <path d={radial(orbit - width, orbit + width, 90)} strokeWidth="0.8" className="stroke-ink" />
        <path
          d={radial(orbit - width * 1.1, orbit + width * 1.4, 0)}
          strokeWidth="1.2"
          className="stroke-ink"
        />
        {/* Past the quarter: two red dashes, a shape of their own. */}
        {over && (
          <path
            d={`M${polarText(orbit - width, -3)}L${polarText(orbit + width * 1.3, -3)}M${polarText(orbit - width, -9)}L${polarText(orbit + width, -9)}`}
            strokeWidth={Math.max(1.4, width * 0.6)}
            className="stroke-fault"
          />
        )}
      </g>
      {unsettled && (
        <text
          x={markX}
          y={markY}
          textAnchor="middle"
          dominantBaseline="central"
          fontSize={Math.max(9, radius * 0.42)}
          className={classNames('font-mono font-section', lit ? 'fill-on-lit' : 'fill-ink')}
          stroke={lit ? 'var(--lit)' : 'var(--glass)'}
          strokeWidth="3"
          paintOrder="stroke"
        >
          ?
        </text>
      )}
    </svg>
  );
}
