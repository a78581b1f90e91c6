import { useRef } from 'react';
import type { Stokes } from '../../shared/optics/stokes';
import { ellipseOutline } from './ellipse-outline';
import { EllipsePath } from './EllipsePath';
import { fieldInWords, type FieldParts, fieldParts } from './field-words';
import { useBoxWidth } from './use-box-width';
import './field-plot.css';

const BOX = 106;
const ELLIPSE_SCALE = 44;
const TRACE = { height: 106, left: 26, right: 44, scale: 21, rows: [26, 81] } as const;
const DEFAULT_WIDTH = 330;
const STEPS_PER_PERIOD = 48;
const PERIODS = 2;

/** The ellipse to the receiver, and its two field components at z = 0 over two periods. */
export function FieldPlot({ state, label }: { readonly state: Stokes; readonly label?: string }) {
  const words = fieldInWords(state);
  const traces = useRef<HTMLDivElement>(null);
  const width = useBoxWidth(traces, DEFAULT_WIDTH);
  return (
    <div
      className="field-plot"
      role="img"
      aria-label={`Field${label === undefined ? '' : ` of ${label}`} at z = 0 over two periods: ${words}.`}
    >
      <svg className="field-box" width={BOX} height={BOX} viewBox={`0 0 ${BOX} ${BOX}`} aria-hidden="true">
        <path
          d={`M4 ${BOX / 2} H${BOX - 4} M${BOX / 2} 4 V${BOX - 4}`}
          stroke="var(--rule)"
          strokeWidth={0.9}
        />
        <text x={BOX - 17} y={BOX / 2 - 6} fontSize={11} fill="var(--ink)">
          H
        </text>
        <text x={BOX / 2 + 6} y={14} fontSize={11} fill="var(--ink)">
          V
        </text>
        <g transform={`translate(${BOX / 2} ${BOX / 2})`}>
          <EllipsePath outline={ellipseOutline(state)} scalePx={ELLIPSE_SCALE} widthPx={2.2} headPx={8} />
        </g>
      </svg>
      <div ref={traces} className="field-traces">
        {width !== null && <Traces state={state} width={width} />}
      </div>
    </div>
  );
}

/** Both components as they swing at z = 0. */
function Traces({ state, width }: { readonly state: Stokes; readonly width: number }) {
  const plotWidth = Math.max(60, width - TRACE.left - TRACE.right);
  const parts = fieldParts(state);
  const periodEnds = [1, 2].map((period) => TRACE.left + (plotWidth * period) / PERIODS);
  return (
    <svg width={width} height={TRACE.height} viewBox={`0 0 ${width} ${TRACE.height}`} aria-hidden="true">
      {periodEnds.map((x) => (
        <path key={x} d={`M${x} 4 V${TRACE.height - 4}`} stroke="var(--rule)" strokeDasharray="2 3" />
      ))}
      {TRACE.rows.map((y) => (
        <path
          key={y}
          d={`M${TRACE.left} ${y} H${TRACE.left + plotWidth}`}
          stroke="var(--rule)"
          strokeWidth={0.8}
        />
      ))}
      <Name y={TRACE.rows[0]} axis="H" />
      <Name y={TRACE.rows[1]} axis="V" />
      {(['h', 'v'] as const).map((component) => (
        <path
          key={component}
          d={tracePath(parts, component, plotWidth)}
          fill="none"
          stroke="var(--ink)"
          strokeWidth={1.5}
          strokeLinejoin="round"
          strokeDasharray={component === 'v' ? '6 3.5' : undefined}
        />
      ))}
      <g fontSize={11} fill="var(--ink-2)">
        <text x={TRACE.left + plotWidth + 6} y={TRACE.rows[0] + 4}>
          at
        </text>
        <text x={TRACE.left + plotWidth + 6} y={TRACE.rows[0] + 20}>
          z = 0
        </text>
      </g>
    </svg>
  );
}

function Name({ y, axis }: { readonly y: number; readonly axis: 'H' | 'V' }) {
  return (
    <text x={0} y={y + 4} fontSize={12} fill="var(--ink)">
      E
      <tspan dy={3} dx={1.5} fontSize={9.5}>
        {axis}
      </tspan>
    </text>
  );
}

function tracePath({ h, v, lagDeg }: FieldParts, which: 'h' | 'v', plotWidth: number): string {
  const lag = ((lagDeg ?? 0) * Math.PI) / 180;
  const steps = STEPS_PER_PERIOD * PERIODS;
  const y0 = which === 'h' ? TRACE.rows[0] : TRACE.rows[1];
  return Array.from({ length: steps + 1 }, (_, k) => {
    const phase = (2 * Math.PI * k) / STEPS_PER_PERIOD;
    const field = which === 'h' ? h * Math.cos(phase) : v * Math.cos(phase - lag);
    const x = TRACE.left + (plotWidth * k) / steps;
    return `${k === 0 ? 'M' : 'L'}${x.toFixed(2)} ${(y0 - TRACE.scale * field).toFixed(2)}`;
  }).join('');
}
