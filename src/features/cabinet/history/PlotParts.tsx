import { formatShortDate } from '../../../lib/format';
import { type HistoryFrame, interval95 } from './history-frame';
import { monthMarks, type PlotScale, type TimeMark } from './plot-scale';
import type { HistoryPoint, HistoryPoints } from './seat-history';

/** The grid of one part with its numbers. */
export function Marks({ scale, frame }: { readonly scale: PlotScale; readonly frame: HistoryFrame }) {
  return scale.marks.map((mark) => (
    <g key={mark}>
      <line
        x1={frame.left}
        x2={frame.width - frame.right}
        y1={scale.place(mark)}
        y2={scale.place(mark)}
        className="stroke-hair"
      />
      <text
        x={frame.left - 8}
        y={scale.place(mark) + 4}
        textAnchor="end"
        className="fill-ink-2 text-xs font-mono"
      >
        {mark.toFixed(scale.decimals).replace('-', '\u2212')}
      </text>
    </g>
  ));
}

export function Points(props: {
  readonly points: readonly HistoryPoint[];
  readonly scale: PlotScale;
  readonly frame: HistoryFrame;
}) {
  const { points, scale, frame } = props;
  return points.map(({ at, value, sigma }, index) => (
    <g key={`${index} ${at}`}>
      <line
        x1={frame.time(at)}
        x2={frame.time(at)}
        y1={scale.place(value - interval95 * sigma)}
        y2={scale.place(value + interval95 * sigma)}
        className="stroke-ink"
        strokeWidth={1.5}
      />
      <circle cx={frame.time(at)} cy={scale.place(value)} r={4} className="fill-ink" />
    </g>
  ));
}

/** Double lines with a head, from the top to the time axis. */
export function Moves({
  moves,
  frame,
}: {
  readonly moves: HistoryPoints['moves'];
  readonly frame: HistoryFrame;
}) {
  return moves.map(({ at, what }) => (
    <g key={`${what} ${at}`} transform={`translate(${frame.time(at)} 0)`} className="stroke-ink">
      <path d={`M-6 ${frame.top}H6`} strokeWidth={2.4} />
      <path d={`M-2 ${frame.top}V${frame.foot}M2 ${frame.top}V${frame.foot}`} strokeWidth={1} />
    </g>
  ));
}

/** What the material gives where each calibration was made: a step for each, joined to one line where they are the same. */
export function Prediction(props: {
  readonly points: readonly { readonly at: number; readonly value: number }[];
  readonly frame: HistoryFrame;
  readonly label: string;
  /** Moments at which something stands that the label is to keep clear of. */
  readonly obstacles: readonly number[];
}) {
  const { points, frame, label, obstacles } = props;
  const { retardance, time, left, right, width } = frame;
  const path = points
    .map(({ at, value }, index) => {
      const before = points[index - 1];
      const after = points[index + 1];
      const start = before === undefined ? left : (time(before.at) + time(at)) / 2;
      const end = after === undefined ? width - right : (time(at) + time(after.at)) / 2;
      return `${index === 0 ? 'M' : 'L'}${start.toFixed(1)} ${retardance.place(value).toFixed(1)}H${end.toFixed(1)}`;
    })
    .join('');
  // Over the line where there is room, under it where the line lies at the top.
  const y = retardance.place(points.at(-1)?.value ?? 0);
  return (
    <>
      <path d={path} fill="none" className="stroke-ink" strokeWidth={1.2} strokeDasharray="5 3.5" />
      <text
        x={freeX(
          obstacles.map((at) => time(at)),
          frame,
        )}
        y={y - 6 < frame.top + 10 ? y + 15 : y - 6}
        className="fill-ink-2 text-s"
        stroke="var(--paper)"
        strokeWidth={5}
        strokeLinejoin="round"
        paintOrder="stroke"
      >
        {label}
      </text>
    </>
  );
}

/** About what a label takes, in px. */
const labelWidth = 190;

/** Where a label begins so that it lies between two obstacles: the first gap that is wide enough, or else the widest. */
function freeX(obstacles: readonly number[], { left, right, width }: HistoryFrame): number {
  const edges = [left, ...obstacles.toSorted((a, b) => a - b), width - right];
  const gaps = edges.slice(1).map((end, index) => ({ start: edges[index] ?? left, end }));
  const size = ({ start, end }: (typeof gaps)[number]) => end - start;
  const roomy = gaps.find((gap) => size(gap) >= labelWidth + 16);
  const widest = gaps.reduce((best, gap) => (size(gap) > size(best) ? gap : best));
  return Math.min((roomy ?? widest).start + 8, width - right - labelWidth);
}

/** Months; between two firsts of a month, the day in the middle. */
function timeMarks(from: number, to: number, count: number): readonly TimeMark[] {
  const months = monthMarks(from, to, count);
  const middle = (from + to) / 2;
  return months.length > 0 ? months : [{ at: middle, label: formatShortDate(new Date(middle)) }];
}

export function TimeAxis({ frame }: { readonly frame: HistoryFrame }) {
  const { from, to, foot, left, right, width } = frame;
  return (
    <>
      <line x1={left} x2={width - right} y1={foot} y2={foot} className="stroke-ink" />
      {timeMarks(from, to, Math.max(2, Math.floor(width / 76))).map(({ at, label }) => (
        <g key={at}>
          <line x1={frame.time(at)} x2={frame.time(at)} y1={foot} y2={foot + 6} className="stroke-ink" />
          <text x={frame.time(at)} y={foot + 22} textAnchor="middle" className="fill-ink-2 text-xs font-mono">
            {label}
          </text>
        </g>
      ))}
    </>
  );
}
