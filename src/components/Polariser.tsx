import { arrowhead } from './polar';
import { seenAngle } from './ring-geometry';
import type { ViewedFrom } from './dial-words';

export interface PolariserProps {
  readonly radius?: number;
  /** The transmission axis in table degrees. */
  readonly axisDeg: number;
  readonly viewedFrom?: ViewedFrom | undefined;
  readonly label?: string | undefined;
}

/** A ruled disc: what it lets through lies along the lines, between two small marks on its rim. */
export function Polariser({ radius = 38, axisDeg, viewedFrom = 'receiver', label }: PolariserProps) {
  const extent = radius + 7;
  const rows = [-4, -3, -2, -1, 1, 2, 3, 4].map((row) => {
    const y = (row / 5) * radius;
    const half = Math.sqrt(radius * radius - y * y) * 0.84;
    return `M${(-half).toFixed(2)} ${y.toFixed(2)}H${half.toFixed(2)}`;
  });
  const accessible = label === undefined ? { 'aria-hidden': true } : { role: 'img', 'aria-label': label };
  return (
    <svg
      {...accessible}
      viewBox={`${-extent} ${-extent} ${2 * extent} ${2 * extent}`}
      width={2 * extent}
      height={2 * extent}
    >
      <g transform={`rotate(${-seenAngle(axisDeg, viewedFrom)})`}>
        <circle r={radius} className="fill-glass stroke-ink" strokeWidth="1.2" />
        <path d={rows.join('')} className="stroke-ink" strokeWidth="0.7" />
        <path d={`M${-radius * 0.9} 0H${radius * 0.9}`} className="stroke-ink" strokeWidth="2.2" />
        <path d={arrowhead([-radius, 0], 0, 7, 8) + arrowhead([radius, 0], 180, 7, 8)} className="fill-ink" />
      </g>
    </svg>
  );
}
