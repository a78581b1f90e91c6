import { type DialScale } from '../../shared/optics/dial';
import { wrap } from '../../shared/optics/units';
import { formatDial } from '../lib/format/angle';
import type { ViewedFrom } from './dial-words';

interface ScaleWindowProps {
  readonly readingDeg: number;
  readonly scale: Pick<DialScale, 'direction' | 'resolutionDeg'>;
  readonly viewedFrom?: ViewedFrom | undefined;
  readonly label?: string | undefined;
  readonly className?: string | undefined;
}

const halfDeg = 9;
const width = 840;
/** How wide a character of the engraved numbers is. */
const characterPx = 11.4;
const perDeg = width / (2 * halfDeg);

/**
 * A straight slice of that mount's engraving, ± 9°, as it looks under an index at the top when it is right. For a mount whose
 * numbers rise as it is turned counter-clockwise, larger numbers stand to the right of the index.
 */
export function ScaleWindow({
  readingDeg,
  scale,
  viewedFrom = 'receiver',
  label,
  className,
}: ScaleWindowProps) {
  const sign = scale.direction * (viewedFrom === 'source' ? -1 : 1);
  const x = (dialDeg: number): number => width / 2 + sign * (dialDeg - readingDeg) * perDeg;
  const first = Math.ceil((readingDeg - halfDeg) * 2);
  const last = Math.floor((readingDeg + halfDeg) * 2);
  const marks = Array.from({ length: last - first + 1 }, (_, index) => (first + index) / 2);
  const numbered = marks.filter((mark) => mark % 5 === 0 && Math.abs(mark - readingDeg) < 8.3);
  const numberOf = (mark: number): string => String(wrap(mark, 360));
  // The index line stops above a number and goes on below it, so that none is struck through.
  const overNumber = numbered.some(
    (mark) => Math.abs(x(mark) - width / 2) < (numberOf(mark).length * characterPx) / 2 + 4,
  );
  const tick = (dialDeg: number, height: number): string => `M${x(dialDeg).toFixed(2)} 97V${97 - height}`;
  return (
    <svg
      viewBox={`0 0 ${width} 98`}
      className={`block w-full ${className ?? ''}`}
      role="img"
      aria-label={label ?? `the scale under the index at ${formatDial(readingDeg, scale.resolutionDeg)}`}
    >
      <path d={`M0.5 0.5H${width - 0.5}V97.5H0.5Z`} className="fill-none stroke-hair" />
      <g fill="none" className="stroke-ink">
        <path
          d={marks
            .filter((mark) => mark % 1 !== 0)
            .map((mark) => tick(mark, 9))
            .join('')}
          strokeWidth="1"
        />
        <path
          d={marks
            .filter((mark) => mark % 1 === 0 && mark % 5 !== 0)
            .map((mark) => tick(mark, 20))
            .join('')}
          strokeWidth="1.4"
        />
        <path
          d={marks
            .filter((mark) => mark % 5 === 0)
            .map((mark) => tick(mark, 26))
            .join('')}
          strokeWidth="2"
        />
        <path d={`M0 97H${width}`} strokeWidth="1.4" />
      </g>
      {numbered.map((mark) => (
        <text key={mark} x={x(mark)} y="62" textAnchor="middle" fontSize="19" className="fill-ink font-mono">
          {numberOf(mark)}
        </text>
      ))}
      <path
        d={overNumber ? `M${width / 2} 20V43M${width / 2} 68V97` : `M${width / 2} 20V97`}
        strokeWidth="2.6"
        className="stroke-act"
      />
      <path d={`M${width / 2} 28L${width / 2 - 9} 14H${width / 2 + 9}Z`} className="fill-act" />
    </svg>
  );
}
