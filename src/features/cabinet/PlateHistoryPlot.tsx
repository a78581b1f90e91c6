import type { Calibration } from '../../../shared/schemas/cabinet';
import { wrapSigned } from '../../../shared/optics/units';
import { formatDate, formatUncertain } from '../../lib/format';
import { monthMarks, type PlotScale, plotScale } from './plot-scale';
import { useWidth } from '../../lib/use-width';

interface Point {
  readonly at: number;
  readonly value: number;
  readonly sigma: number;
}

const height = 312;
const left = 48;
const right = 12;
const upper = { from: 136, to: 28 } as const;
const lower = { from: 268, to: 184 } as const;

function bandScale(
  points: readonly Point[],
  band: { from: number; to: number },
  leastSpan: number,
): PlotScale {
  return plotScale(
    Math.min(...points.map(({ value, sigma }) => value - sigma)),
    Math.max(...points.map(({ value, sigma }) => value + sigma)),
    band,
    leastSpan,
  );
}

function Band(props: {
  readonly points: readonly Point[];
  readonly scale: PlotScale;
  readonly time: (at: number) => number;
  readonly width: number;
}) {
  const { points, scale, time, width } = props;
  return (
    <g>
      {scale.marks.map((mark) => (
        <g key={mark}>
          <line
            x1={left}
            x2={width - right}
            y1={scale.place(mark)}
            y2={scale.place(mark)}
            className="stroke-hair"
          />
          <text
            x={left - 8}
            y={scale.place(mark) + 4}
            textAnchor="end"
            className="fill-ink-2 text-xs font-mono"
          >
            {mark.toFixed(scale.decimals).replace('-', '\u2212')}
          </text>
        </g>
      ))}
      {points.map(({ at, value, sigma }) => (
        <g key={at}>
          <line
            x1={time(at)}
            x2={time(at)}
            y1={scale.place(value - sigma)}
            y2={scale.place(value + sigma)}
            className="stroke-ink"
            strokeWidth={1.5}
          />
          <circle cx={time(at)} cy={scale.place(value)} r={4} className="fill-ink" />
        </g>
      ))}
    </g>
  );
}

/**
 * Retardance and zero of one seat over time, with ± σ. The zero is drawn as its change since the seat's first calibration,
 * taken around the dial the short way. The table of calibrations holds the same numbers in words.
 */
export function PlateHistoryPlot(props: {
  readonly plateName: string;
  /** Newest first, as the API gives them. */
  readonly calibrations: readonly Calibration[];
  readonly tableId: string;
}) {
  const { plateName, calibrations, tableId } = props;
  const [frameRef, width] = useWidth<HTMLDivElement>(430);
  const oldestFirst = [...calibrations].reverse();
  const [first] = oldestFirst;
  if (first === undefined) return null;
  const times = oldestFirst.map(({ measuredAt }) => new Date(measuredAt).getTime());
  const span = Math.max(Math.max(...times) - Math.min(...times), 86_400_000);
  const [from, to] = [Math.min(...times) - span * 0.06, Math.max(...times) + span * 0.06];
  const time = (at: number) => left + ((at - from) / (to - from)) * (width - left - right);
  const point = (value: number, sigma: number, index: number): Point => ({
    at: times[index] ?? 0,
    value,
    sigma,
  });
  const retardances = oldestFirst.map((c, k) => point(c.retardanceDeg, c.retardanceSigmaDeg, k));
  const zeros = oldestFirst.map((c, k) =>
    point(wrapSigned(c.offsetDeg - first.offsetDeg, 360), c.offsetSigmaDeg, k),
  );
  const newest = calibrations[0] ?? first;
  const summary =
    `${plateName}, ${calibrations.length} calibrations since ${formatDate(new Date(first.measuredAt))}: retardance ` +
    `${formatUncertain(first.retardanceDeg, first.retardanceSigmaDeg)} to ${formatUncertain(newest.retardanceDeg, newest.retardanceSigmaDeg)} degrees, ` +
    `zero ${formatUncertain(first.offsetDeg, first.offsetSigmaDeg)} to ${formatUncertain(newest.offsetDeg, newest.offsetSigmaDeg)} degrees.`;
  return (
    <div ref={frameRef}>
      <svg
        width={width}
        height={height}
        role="img"
        aria-label={summary}
        aria-describedby={tableId}
        className="block"
      >
        <text x={left + 6} y={13} className="fill-ink-2 text-s">
          retardance, degrees, ± σ
        </text>
        <Band points={retardances} scale={bandScale(retardances, upper, 1)} time={time} width={width} />
        <text x={left + 6} y={lower.to - 12} className="fill-ink-2 text-s">
          zero since the first one, degrees, ± σ
        </text>
        <Band points={zeros} scale={bandScale(zeros, lower, 0.5)} time={time} width={width} />
        <line x1={left} x2={width - right} y1={lower.from + 8} y2={lower.from + 8} className="stroke-ink" />
        {monthMarks(from, to, Math.max(2, Math.floor(width / 76))).map(({ at, label }) => (
          <g key={at}>
            <line
              x1={time(at)}
              x2={time(at)}
              y1={lower.from + 8}
              y2={lower.from + 14}
              className="stroke-ink"
            />
            <text
              x={time(at)}
              y={lower.from + 28}
              textAnchor="middle"
              className="fill-ink-2 text-xs font-mono"
            >
              {label}
            </text>
          </g>
        ))}
      </svg>
    </div>
  );
}
