import type { ScanFrame } from './scan-frame';
import type { PlottedPoint } from './scan-points';

/** Beyond this many, points are dots of one path: thousands of circles would make the page slow. */
const MOST_CIRCLES = 600;

interface MarksProps {
  readonly frame: ScanFrame;
  readonly points: readonly PlottedPoint[];
}

const CROSS = 'M-4.5-4.5L4.5 4.5M-4.5 4.5L4.5-4.5';

/** Points as open circles over the curve; those left out as crosses, those that look wrong with a ring. */
export function CurveAndPoints({ frame, points, path }: MarksProps & { readonly path: string }) {
  const { x, unwrapped, upper } = frame;
  const place = ({ dialDeg, value }: PlottedPoint) =>
    [x(unwrapped(dialDeg)).toFixed(1), upper.y(value).toFixed(1)] as const;
  const used = points.filter(({ isUsed }) => isUsed);
  const isDense = used.length > MOST_CIRCLES;
  return (
    <>
      <path d={path} fill="none" className="stroke-ink" strokeWidth={1.8} strokeLinejoin="round" />
      {isDense ? (
        <path
          d={used.map((point) => `M${place(point).join(' ')}h0`).join('')}
          className="stroke-ink"
          strokeWidth={2}
          strokeLinecap="round"
        />
      ) : (
        used.map((point) => {
          const [cx, cy] = place(point);
          return (
            <circle
              key={point.line}
              cx={cx}
              cy={cy}
              r={3.6}
              className="fill-paper stroke-ink"
              strokeWidth={1.5}
            />
          );
        })
      )}
      {points
        .filter(({ isUsed }) => !isUsed)
        .map((point) => (
          <path
            key={point.line}
            d={CROSS}
            transform={`translate(${place(point).join(' ')})`}
            className="stroke-ink-2"
            strokeWidth={1.6}
          />
        ))}
      {points
        .filter(({ isUsed, isSuspected }) => isUsed && isSuspected)
        .slice(0, MOST_CIRCLES)
        .map((point) => {
          const [cx, cy] = place(point);
          return (
            <circle
              key={point.line}
              cx={cx}
              cy={cy}
              r={9}
              fill="none"
              className="stroke-fault"
              strokeWidth={1.6}
            />
          );
        })}
    </>
  );
}

/** A bar for each row in use. */
export function Residuals({ frame, points }: MarksProps) {
  const { x, unwrapped, lower } = frame;
  const used = points.filter(({ isUsed }) => isUsed);
  const zero = lower.y(0).toFixed(1);
  return (
    <path
      d={used
        .map(
          ({ dialDeg, residualSigmas }) =>
            `M${x(unwrapped(dialDeg)).toFixed(1)} ${zero}V${lower.y(residualSigmas).toFixed(1)}`,
        )
        .join('')}
      className="stroke-ink"
      strokeWidth={used.length > MOST_CIRCLES ? 1 : 2.2}
    />
  );
}
