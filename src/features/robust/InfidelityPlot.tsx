import { type PointerEvent, useId } from 'react';
import { withTrueMinus } from '../../lib/format';
import { useWidth } from '../../lib/use-width';
import type { Design } from './design';
import type { DesignCurves } from './design-curves';
import { errorName, errorWords } from './design-words';
import { apartLabels, type InfidelityAxis, infidelityAxis, shareOfAxis } from './infidelity-axis';

interface InfidelityPlotProps {
  readonly design: Design;
  readonly curves: DesignCurves;
  readonly tolerance: number;
  /** The error that the sphere shows, and 1 − F of the composite there. */
  readonly here: { readonly error: number; readonly infidelity: number };
  /** The plot in a sentence, for who can't see it. */
  readonly words: string;
  readonly onLookAt: (error: number) => void;
}

const HEIGHT = 360;
const LABEL_GAP = 17;

interface Frame {
  readonly left: number;
  readonly right: number;
  readonly top: number;
  readonly foot: number;
}

/** 1 − F against the error, better up: the composite as a full line, the plain setting dashed, the tolerance heavy. */
export function InfidelityPlot(props: InfidelityPlotProps) {
  const { design, curves, tolerance, here, words, onLookAt } = props;
  const [box, width] = useWidth<HTMLDivElement>(640);
  const clip = useId();
  const frame: Frame = { left: 52, right: Math.max(200, width - 80), top: 34, foot: HEIGHT - 42 };
  const reach = Math.max(...curves.errors);
  const axis = axisOf(design, curves, tolerance);
  const x = (error: number) => frame.left + ((error + reach) / (2 * reach)) * (frame.right - frame.left);
  const y = (infidelity: number) => frame.foot - shareOfAxis(axis, infidelity) * (frame.foot - frame.top);
  const clamped = (value: number) => Math.min(frame.foot, Math.max(frame.top, value));
  const line = (values: readonly number[]) =>
    values
      .map((value, k) => {
        // Far above the head a line is cut off anyway; it must not run to infinity.
        const at = Math.max(-HEIGHT, y(value));
        return `${k === 0 ? 'M' : 'L'}${x(curves.errors[k] ?? 0).toFixed(1)} ${at.toFixed(1)}`;
      })
      .join('');
  const ends = [curves.composite.at(-1) ?? 1, curves.plain.at(-1) ?? 1, tolerance];
  const labels = apartLabels(
    ends.map((value) => clamped(y(value)) + 4),
    LABEL_GAP,
    [frame.top + 4, frame.foot + 4],
  );
  const look = (event: PointerEvent<SVGRectElement>) => {
    const { left, width: wide } = event.currentTarget.getBoundingClientRect();
    if (wide > 0) onLookAt(((event.clientX - left) / wide) * 2 * reach - reach);
  };
  return (
    <div ref={box}>
      <svg role="img" aria-label={words} width={width} height={HEIGHT} className="block overflow-visible">
        <text x={0} y={14} className="fill-ink-2 text-s">
          1 − F, better up
        </text>
        <Grid frame={frame} axis={axis} y={y} />
        <clipPath id={clip}>
          <rect
            x={frame.left}
            y={frame.top}
            width={frame.right - frame.left}
            height={frame.foot - frame.top}
          />
        </clipPath>
        {[-design.width, design.width].map((edge) => (
          <path
            key={edge}
            d={`M${x(edge)} ${frame.top}V${frame.foot}`}
            className="stroke-ink-3"
            strokeDasharray="1.5 3.5"
            strokeWidth="1"
          />
        ))}
        <g clipPath={`url(#${clip})`} fill="none">
          <path d={line(curves.plain)} className="stroke-ink" strokeWidth="1.6" strokeDasharray="7 4" />
          <path d={line(curves.composite)} className="stroke-ink" strokeWidth="2.2" strokeLinejoin="round" />
        </g>
        <path
          d={`M${frame.left} ${y(tolerance) - 7}V${y(tolerance)}H${frame.right}V${y(tolerance) - 7}`}
          fill="none"
          className="stroke-ink"
          strokeWidth="3"
        />
        <ErrorScale frame={frame} design={design} x={x} />
        <path
          d={`M${x(here.error)} ${clamped(y(here.infidelity))}V${frame.foot}`}
          className="stroke-ink"
          strokeWidth="0.8"
        />
        <circle
          cx={x(here.error)}
          cy={clamped(y(here.infidelity))}
          r="5"
          className="fill-lit stroke-ink"
          strokeWidth="1.4"
        />
        {['composite', 'plain', 'tolerance'].map((text, k) => (
          <text
            key={text}
            x={frame.right + 8}
            y={labels[k] ?? 0}
            className={k === 0 ? 'fill-ink text-s font-strong' : 'fill-ink text-s'}
          >
            {text}
          </text>
        ))}
        <rect
          x={frame.left}
          y={frame.top}
          width={frame.right - frame.left}
          height={frame.foot - frame.top}
          fill="transparent"
          className="cursor-crosshair"
          onPointerDown={look}
        />
      </svg>
    </div>
  );
}

function axisOf(
  design: Design,
  { errors, composite, plain }: DesignCurves,
  tolerance: number,
): InfidelityAxis {
  // An eighth of the range out: nearer to no error a curve that cancels has no end.
  const better = errors.flatMap((error, k) =>
    Math.abs(error) >= design.width / 8 ? [Math.min(composite[k] ?? 1, plain[k] ?? 1)] : [],
  );
  return infidelityAxis({
    worst: Math.max(...composite, ...plain),
    better: Math.min(...better),
    tolerance,
  });
}

function Grid(props: {
  readonly frame: Frame;
  readonly axis: InfidelityAxis;
  readonly y: (infidelity: number) => number;
}) {
  const { frame, axis, y } = props;
  return (
    <g>
      <path d={`M${frame.left} ${frame.top}V${frame.foot}`} className="stroke-ink" strokeWidth="1" />
      {axis.numbered.map((power) => {
        const at = y(10 ** power);
        return (
          <g key={power}>
            <path d={`M${frame.left} ${at}H${frame.right}`} className="stroke-hair" strokeWidth="1" />
            <path d={`M${frame.left - 5} ${at}H${frame.left}`} className="stroke-ink" strokeWidth="1" />
            <text x={frame.left - 9} y={at + 4} textAnchor="end" className="fill-ink-2 font-mono text-xs">
              {power === 0 ? (
                '1'
              ) : (
                <>
                  10
                  <tspan dy={-5} className="text-[0.625rem]">
                    {withTrueMinus(String(power))}
                  </tspan>
                </>
              )}
            </text>
          </g>
        );
      })}
    </g>
  );
}

function ErrorScale(props: {
  readonly frame: Frame;
  readonly design: Design;
  readonly x: (error: number) => number;
}) {
  const { frame, design, x } = props;
  const { width, error } = design;
  const unit = error === 'retardance' ? 100 : 1;
  return (
    <g>
      <path d={`M${frame.left} ${frame.foot}H${frame.right}`} className="stroke-ink" strokeWidth="1" />
      {[-2, -1, 0, 1, 2].map((step) => (
        <g key={step}>
          <path d={`M${x(step * width)} ${frame.foot}v5`} className="stroke-ink" strokeWidth="1" />
          <text
            x={x(step * width)}
            y={frame.foot + 19}
            textAnchor="middle"
            className="fill-ink-2 font-mono text-xs"
          >
            {withTrueMinus(String(Number((step * width * unit).toPrecision(4))))}
          </text>
        </g>
      ))}
      <text x={frame.left} y={frame.foot + 38} className="fill-ink-2 text-s">
        {errorName(error)}, {error === 'retardance' ? 'per cent' : 'nm'}
      </text>
      <title>{`The range asked about is ±${errorWords(width, error)}`}</title>
    </g>
  );
}
