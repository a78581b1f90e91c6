import { classNames } from './class-names';

export type BasisLetter = 'H' | 'V' | 'D' | 'A' | 'R' | 'L';

const shapes = {
  H: { shape: 'square', filled: true },
  V: { shape: 'square', filled: false },
  D: { shape: 'diamond', filled: true },
  A: { shape: 'diamond', filled: false },
  R: { shape: 'disc', filled: true },
  L: { shape: 'disc', filled: false },
} as const;

const paints = {
  square: { fill: 'fill-hv', stroke: 'stroke-hv' },
  diamond: { fill: 'fill-da', stroke: 'stroke-da' },
  disc: { fill: 'fill-rl', stroke: 'stroke-rl' },
} as const;

/** The mark's outline around 0, 0, for use inside another drawing. */
function BasisShape({ letter, size = 13 }: { readonly letter: BasisLetter; readonly size?: number }) {
  const { shape, filled } = shapes[letter];
  const { fill, stroke } = paints[shape];
  const half = filled ? size / 2 : size / 2 - 1;
  const look = filled ? fill : classNames('fill-glass', stroke);
  const width = filled ? 0 : 1.9;
  if (shape === 'disc')
    return <circle r={filled ? half * 1.05 : half} className={look} strokeWidth={width} />;
  const corner = shape === 'square' ? half : half * 1.4;
  const d =
    shape === 'square'
      ? `M${-corner} ${-corner}H${corner}V${corner}H${-corner}Z`
      : `M0 ${-corner}L${corner} 0L0 ${corner}L${-corner} 0Z`;
  return <path d={d} className={look} strokeWidth={width} />;
}

interface BasisMarkProps {
  readonly letter: BasisLetter;
  readonly size?: number;
  /** The letter in ink beside it stands in the text already. */
  readonly decorative?: boolean;
}

/** Shape, then colour: square, diamond, disc; filled for the first of the pair, hollow for the second. */
export function BasisMark({ letter, size = 13, decorative = false }: BasisMarkProps) {
  const extent = size * 0.8;
  const accessible = decorative ? { 'aria-hidden': true } : { role: 'img', 'aria-label': letter };
  return (
    <svg
      {...accessible}
      viewBox={`${-extent} ${-extent} ${2 * extent} ${2 * extent}`}
      width={2 * extent}
      height={2 * extent}
    >
      <BasisShape letter={letter} size={size} />
    </svg>
  );
}
