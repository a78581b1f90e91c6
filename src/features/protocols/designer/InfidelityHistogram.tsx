import type { MonteCarloSummary } from '../../../../shared/optics/monte-carlo';
import { Scientific } from '../../../components/Scientific';

interface InfidelityHistogramProps {
  readonly summary: MonteCarloSummary;
  readonly tolerance: number;
  /** Of the draws, those that don't exceed it. */
  readonly shareWithin: number;
  /** The 5 % and 95 % points of first order. */
  readonly firstOrder: { readonly low: number; readonly high: number };
  readonly asTable: boolean;
}

const width = 560;
const height = 132;
const plot = { left: 8, right: 552, top: 22, base: 104 } as const;

interface Bin {
  readonly from: number;
  readonly to: number;
  readonly count: number;
}

/** The bins that hold something, and two empty ones on each side. */
function filledBins({ histogram }: MonteCarloSummary): readonly Bin[] {
  const { edges, counts } = histogram;
  const first = counts.findIndex((count) => count > 0);
  const last = counts.findLastIndex((count) => count > 0);
  if (first < 0) return [];
  return counts
    .map((count, k) => ({ from: edges[k] ?? 0, to: edges[k + 1] ?? 1, count }))
    .slice(Math.max(0, first - 2), last + 3);
}

/** How the drawn 1 − F lie: better to the right, as on every axis of fidelity; the bracket is the tolerance. */
export function InfidelityHistogram({
  summary,
  tolerance,
  shareWithin,
  firstOrder,
  asTable,
}: InfidelityHistogramProps) {
  const bins = filledBins(summary);
  const worst = Math.log10(Math.max(bins.at(-1)?.to ?? 1, tolerance * 1.2));
  const best = Math.log10(Math.min(bins[0]?.from ?? 1e-12, tolerance / 1.2));
  const x = (value: number) =>
    plot.left + ((worst - Math.log10(value)) / (worst - best)) * (plot.right - plot.left);
  const most = Math.max(1, ...bins.map(({ count }) => count));
  const powers = Array.from(
    { length: Math.max(0, Math.floor(worst) - Math.ceil(best) + 1) },
    (_, k) => Math.ceil(best) + k,
  );
  const words = `Histogram of 1 − F over ${summary.draws} draws; ${(100 * shareWithin).toFixed(1)} per cent lie within the tolerance.`;
  return (
    <figure className="m-0 mt-2">
      <svg role="img" aria-label={words} viewBox={`0 0 ${width} ${height}`} className="w-full max-w-160">
        <text x={plot.left} y={12} className="histogram-text" fill="var(--ink-2)">
          1 − F of each draw, better to the right
        </text>
        {bins.map(({ from, to, count }) => (
          <rect
            key={from}
            x={x(to)}
            y={plot.base - (count / most) * (plot.base - plot.top)}
            width={Math.max(0.5, x(from) - x(to) - 1)}
            height={(count / most) * (plot.base - plot.top)}
            fill="none"
            stroke="var(--ink)"
            strokeWidth={1.2}
          />
        ))}
        <line x1={plot.left} x2={plot.right} y1={plot.base} y2={plot.base} stroke="var(--ink)" />
        {powers.map((power) => (
          <g key={power} transform={`translate(${x(10 ** power)} ${plot.base})`}>
            <line y2={5} stroke="var(--ink)" />
            <text
              y={20}
              textAnchor={x(10 ** power) > plot.right - 16 ? 'end' : 'middle'}
              className="histogram-text"
              fill="var(--ink-2)"
            >
              10
              <tspan dy={-5} className="histogram-power">
                {String(power).replace('-', '\u2212')}
              </tspan>
            </text>
          </g>
        ))}
        <path
          d={`M ${x(tolerance) + 6} ${plot.top} H ${x(tolerance)} V ${plot.base} H ${x(tolerance) + 6}`}
          fill="none"
          stroke="var(--ink)"
          strokeWidth={1.8}
        />
        {firstOrder.low > 0 && (
          <line
            x1={x(firstOrder.high)}
            x2={x(Math.max(firstOrder.low, 10 ** best))}
            y1={plot.base + 1}
            y2={plot.base + 1}
            stroke="var(--ink)"
            strokeWidth={3.5}
          />
        )}
      </svg>
      <figcaption className="text-s text-ink-2">
        The bracket is the tolerance; the heavy stroke is first order’s 5 % to 95 %.{' '}
        {(100 * shareWithin).toFixed(1)} % of the draws lie within.
      </figcaption>
      {asTable && (
        <table className="mt-2 text-right text-s">
          <thead>
            <tr className="border-b border-hair text-ink-2">
              <th scope="col" className="pr-6 font-words">
                1 − F from
              </th>
              <th scope="col" className="pr-6 font-words">
                to
              </th>
              <th scope="col" className="font-words">
                draws
              </th>
            </tr>
          </thead>
          <tbody>
            {bins.map(({ from, to, count }) => (
              <tr key={from}>
                <td className="pr-6">
                  <Scientific value={from} />
                </td>
                <td className="pr-6">
                  <Scientific value={to} />
                </td>
                <td className="font-mono">{count}</td>
              </tr>
            ))}
          </tbody>
        </table>
      )}
    </figure>
  );
}
