import { infidelityAscii } from '../lib/format/fidelity';
import { classNames } from './class-names';
import { fidelityVerdict, type InfidelityInterval, type Verdict } from './fidelity-verdict';

interface FidelityChipProps {
  readonly infidelity: InfidelityInterval;
  readonly tolerance: number;
  /** Both carry the verdict in the point's shape; the bar is the 95 % interval of a measured one, 5 % to 95 % of a predicted one. */
  readonly kind: 'measured' | 'predicted';
  /** The same before a change: thin, above. */
  readonly before?: InfidelityInterval | undefined;
  /** Powers of ten at the left and right end. Better is to the right. */
  readonly axis?: readonly [worst: number, best: number];
  readonly width?: number;
  readonly className?: string | undefined;
}

const numberWords = (value: number): string => infidelityAscii(value).replace('-', '\u2212');

/** All four numbers in a sentence, for hover and for who can't see the drawing. */
export function fidelityWords(
  { value, low, high }: InfidelityInterval,
  tolerance: number,
  kind: FidelityChipProps['kind'],
): string {
  const verdict = fidelityVerdict({ value, low, high }, tolerance);
  const range = kind === 'measured' ? '95 % interval' : '5 % to 95 %';
  const said = kind === 'measured' ? verdict : `predicted, ${verdict}`;
  return `1 − F ${numberWords(value)}, ${range} ${numberWords(low)} to ${numberWords(high)}, tolerance ${numberWords(tolerance)}: ${said}`;
}

/** 1 − F on a log axis, the bracket at the tolerance, and what is known as a bar. */
export function FidelityChip({
  infidelity,
  tolerance,
  kind,
  before,
  axis = [-2, -6],
  width = 196,
  className,
}: FidelityChipProps) {
  const [worst, best] = axis;
  const span = worst - best;
  const x = (value: number): number => {
    const power = value <= 0 ? best : Math.log10(value);
    return Math.min(1, Math.max(0, (worst - power) / span)) * width;
  };
  const decades = Array.from(
    { length: Math.abs(Math.round(span)) + 1 },
    (_, index) => (index / Math.abs(span)) * width,
  );
  const words = fidelityWords(infidelity, tolerance, kind);
  const verdict = fidelityVerdict(infidelity, tolerance);
  const y = before === undefined ? 0 : 4;
  return (
    <svg
      role="img"
      aria-label={words}
      viewBox={`-3 -13 ${width + 6} 26`}
      width={width + 6}
      height="26"
      className={classNames('-ml-[3px] shrink-0 overflow-visible', className)}
    >
      <title>{words}</title>
      <path d={`M0 0H${width}`} className="stroke-rule" strokeWidth="0.6" />
      <path
        d={decades.map((at) => `M${at.toFixed(1)} -3V3`).join('')}
        className="stroke-rule"
        strokeWidth="1"
      />
      {before !== undefined && (
        <g>
          <path d={`M${x(before.high)} -4H${x(before.low)}`} className="stroke-ink-3" strokeWidth="1.2" />
          <circle
            cx={x(before.value)}
            cy="-4"
            r="2.6"
            className="fill-paper stroke-ink-3"
            strokeWidth="1.2"
          />
        </g>
      )}
      <path
        d={`M${x(tolerance) + 4} -12H${x(tolerance)}V12H${x(tolerance) + 4}`}
        fill="none"
        className="stroke-ink"
        strokeWidth="1.5"
      />
      <InfidelityBar
        from={x(infidelity.high)}
        at={x(infidelity.value)}
        to={x(infidelity.low)}
        y={y}
        verdict={verdict}
      />
    </svg>
  );
}

interface InfidelityBarProps {
  readonly from: number;
  readonly at: number;
  readonly to: number;
  readonly y: number;
  readonly verdict: Verdict;
}

/** The interval with its end marks, and the point: filled, open, or a cross. */
function InfidelityBar({ from, at, to, y, verdict }: InfidelityBarProps) {
  const out = verdict === 'not within';
  const line = out ? 'stroke-fault' : 'stroke-ink';
  return (
    <g fill="none">
      <path d={`M${from} ${y}H${to}`} className={line} strokeWidth={out ? 2 : 2.2} />
      <path d={`M${from} ${y - 4}V${y + 4}M${to} ${y - 4}V${y + 4}`} className={line} strokeWidth="1.3" />
      {out ? (
        <path
          d={`M${at - 4} ${y - 4}L${at + 4} ${y + 4}M${at - 4} ${y + 4}L${at + 4} ${y - 4}`}
          className={line}
          strokeWidth="2"
        />
      ) : (
        <circle
          cx={at}
          cy={y}
          r={verdict === 'within' ? 3.6 : 4}
          strokeWidth="1.8"
          className={classNames(line, verdict === 'within' ? 'fill-ink' : 'fill-paper')}
        />
      )}
    </g>
  );
}
