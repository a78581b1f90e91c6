const arcRadius = 25;
const longTicks = [0, 45, 90];

/** A point at `angleDeg` counter-clockwise from the beam, with the arc's centre at 0, 0. */
function at(radius: number, angleDeg: number): string {
  const angle = (angleDeg * Math.PI) / 180;
  return `${(radius * Math.cos(angle)).toFixed(2)} ${(-radius * Math.sin(angle)).toFixed(2)}`;
}

function ticks(fine: boolean): string {
  const angles = fine ? Array.from({ length: 13 }, (_, index) => index * 7.5) : longTicks;
  return angles
    .map(
      (angle) => `M${at(arcRadius, angle)}L${at(arcRadius + (longTicks.includes(angle) ? 6.5 : 3.2), angle)}`,
    )
    .join('');
}

/** The mark's lines around 0, 0, the point where the beam starts. Draw it inside an `svg`. */
export function MarkLines({ fine = true }: { readonly fine?: boolean }) {
  return (
    <g fill="none" className="stroke-ink">
      <path
        d={`M${at(arcRadius, 0)}A${arcRadius} ${arcRadius} 0 0 0 ${at(arcRadius, 90)}`}
        strokeWidth="2.2"
      />
      <path d={ticks(fine)} strokeWidth={fine ? 1.4 : 2.6} />
      {fine && (
        <path
          d={longTicks.map((angle) => `M${at(arcRadius, angle)}L${at(arcRadius + 6.5, angle)}`).join('')}
          strokeWidth="2.2"
        />
      )}
    </g>
  );
}

interface MarkProps {
  /** Height in px. Below 20 only the arc and its three long ticks remain. */
  readonly size?: number;
  readonly className?: string | undefined;
}

/** The mark by itself, one colour, with the beam along its lower edge. */
export function Mark({ size = 32, className }: MarkProps) {
  return (
    <svg width={size} height={size} viewBox="-2 -33 36 36" aria-hidden="true" className={className}>
      <MarkLines fine={size >= 20} />
      <path d="M0 0H32" strokeWidth="2.2" className="stroke-ink" />
    </svg>
  );
}
