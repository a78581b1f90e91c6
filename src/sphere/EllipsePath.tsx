import type { EllipseOutline } from './ellipse-outline';

interface Props {
  readonly outline: EllipseOutline;
  /** Pixels per unit of amplitude. */
  readonly scalePx: number;
  readonly widthPx: number;
  /** Length of an arrowhead. */
  readonly headPx: number;
  readonly fill?: string;
  readonly stroke?: string;
}

/** An ellipse about the origin as the receiver sees it; linear light is a line with end marks. */
export function EllipsePath({
  outline,
  scalePx,
  widthPx,
  headPx,
  fill = 'none',
  stroke = 'var(--ink)',
}: Props) {
  const { azimuthDeg, major, minor, sense, heads } = outline;
  if (sense === 0) {
    const reach = major * scalePx;
    const end = Math.max(2.5, widthPx * 1.8);
    return (
      <path
        transform={`rotate(${-azimuthDeg})`}
        d={`M${-reach} 0 H${reach} M${-reach} ${-end} V${end} M${reach} ${-end} V${end}`}
        fill="none"
        stroke={stroke}
        strokeWidth={widthPx}
      />
    );
  }
  return (
    <g>
      <ellipse
        transform={`rotate(${-azimuthDeg})`}
        rx={major * scalePx}
        ry={minor * scalePx}
        fill={fill}
        stroke={stroke}
        strokeWidth={widthPx}
      />
      {heads.map(({ at, towardsDeg }) => (
        <path
          key={towardsDeg}
          transform={`translate(${at.x * scalePx} ${-at.y * scalePx}) rotate(${-towardsDeg})`}
          d={`M${headPx / 2} 0 L${-headPx / 2} ${headPx * 0.42} V${-headPx * 0.42} Z`}
          fill={stroke}
        />
      ))}
    </g>
  );
}
