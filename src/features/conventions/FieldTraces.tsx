import { fieldAt, radians, type Stokes, stokesToJones } from '../../../shared/optics';
import { fieldInWords } from '../../sphere/field-words';
import { useWidth } from '../../lib/use-width';

const HEIGHT = 232;
const LEFT = 28;
const RIGHT = 16;
const ROWS = { h: 56, v: 152 } as const;
const SCALE = 40;
const AXIS = 206;
const STEPS = 96;
const EIGHTHS = 8;
const DEFAULT_WIDTH = 380;

function trace(stokes: Stokes, which: 'h' | 'v', plotWidth: number): string {
  const jones = stokesToJones(stokes);
  return Array.from({ length: STEPS + 1 }, (_, k) => {
    const field = fieldAt(jones, radians((2 * Math.PI * k) / STEPS))[which];
    const x = LEFT + (plotWidth * k) / STEPS;
    return `${k === 0 ? 'M' : 'L'}${x.toFixed(2)} ${(ROWS[which] - SCALE * field).toFixed(2)}`;
  }).join('');
}

/** The two components of the field at z = 0 over one period, ruled at the same eighths that the ellipse is numbered by. */
export function FieldTraces({ stokes }: { readonly stokes: Stokes }) {
  const [box, width] = useWidth<HTMLDivElement>(DEFAULT_WIDTH);
  const plotWidth = Math.max(120, width - LEFT - RIGHT);
  const jones = stokesToJones(stokes);
  const eighths = Array.from({ length: EIGHTHS + 1 }, (_, k) => ({
    k,
    x: LEFT + (plotWidth * k) / EIGHTHS,
    field: fieldAt(jones, radians((2 * Math.PI * k) / EIGHTHS)),
  }));
  return (
    <div ref={box} className="min-w-0 overflow-hidden">
      <svg
        role="img"
        aria-label={`The field at z = 0 over one period: ${fieldInWords(stokes)}.`}
        width={width}
        height={HEIGHT}
        viewBox={`0 0 ${width} ${HEIGHT}`}
        className="block"
      >
        {eighths.map(({ k, x }) => (
          <g key={k}>
            <path
              d={`M${x} 10V${AXIS}`}
              className="stroke-hair"
              strokeDasharray={k % 2 === 0 ? undefined : '2 3'}
            />
            <path d={`M${x} ${AXIS}v${k % 2 === 0 ? 7 : 4}`} className="stroke-ink" />
            <text x={x} y={HEIGHT - 5} textAnchor="middle" fontSize="12" className="fill-ink-2 font-mono">
              {k === EIGHTHS ? 'T' : k}
            </text>
          </g>
        ))}
        <path d={`M${LEFT} ${AXIS}H${LEFT + plotWidth}`} className="stroke-ink" />
        {(['h', 'v'] as const).map((which) => (
          <g key={which}>
            <path
              d={`M${LEFT} ${ROWS[which]}H${LEFT + plotWidth}`}
              className="stroke-rule"
              strokeWidth="0.8"
            />
            <text x={0} y={ROWS[which] + 4} fontSize="13" className="fill-ink">
              E
              <tspan dy={3} dx={1} fontSize="10">
                {which.toUpperCase()}
              </tspan>
            </text>
            <path
              d={trace(stokes, which, plotWidth)}
              fill="none"
              className="stroke-ink"
              strokeWidth="1.6"
              strokeLinejoin="round"
              strokeDasharray={which === 'v' ? '6 3.5' : undefined}
            />
            {eighths.map(({ k, x, field }) => (
              <circle
                key={k}
                cx={x}
                cy={ROWS[which] - SCALE * field[which]}
                r="2.6"
                className="fill-paper stroke-ink"
                strokeWidth="1.2"
              />
            ))}
          </g>
        ))}
      </svg>
      <p className="text-xs text-ink-2 mt-1">time, in eighths of a period T; one period at z = 0</p>
    </div>
  );
}
