import { useMemo } from 'react';
import { formatUncertain, withTrueMinus } from '../../lib/format';
import { useWidth } from '../../lib/use-width';
import { CurveAndPoints, Residuals } from './ScanMarks';
import { engraved, type ScanFrame, scanFrame } from './scan-frame';
import { type FittedScan, fittedCurve, plottedPoints, type ZeroMark, zeroMarks } from './scan-points';
import { scanSummary, valueWords } from './scan-words';

const CURVE_STEPS = 360;
const DENSE_STEP_DEG = 1;

interface ScanPlotProps {
  readonly scan: FittedScan;
  readonly plateName: string;
  /** Of the table with the same numbers, where there is one. */
  readonly tableId?: string | undefined;
}

/** Share of power or power against the dial, the fitted curve, the zero as a line of light, and residuals in σ below. */
export function ScanPlot({ scan, plateName, tableId }: ScanPlotProps) {
  const [box, width] = useWidth<HTMLDivElement>(520);
  const points = useMemo(() => plottedPoints(scan), [scan]);
  const curve = useMemo(() => sampledCurve(scan), [scan]);
  const frame = scanFrame(points, { least: Math.min(...curve), most: Math.max(...curve) }, width);
  const { fit } = scan.found;
  const caption =
    fit.sigmaFrom === 'rows'
      ? `residuals in σ; χ² ${fit.chiSquared.toFixed(1)} for ${fit.degreesOfFreedom}`
      : `residuals in σ of their own scatter, ${fit.degreesOfFreedom} degrees of freedom`;
  return (
    <div ref={box}>
      <p className="text-s text-ink-2 pl-11">{valueWords(scan)}</p>
      <svg
        role="img"
        aria-label={scanSummary(scan, plateName)}
        aria-describedby={tableId}
        width={width}
        height={frame.height}
        className="block overflow-visible"
      >
        <Axes frame={frame} />
        <CurveAndPoints frame={frame} points={points} path={curvePath(scan, frame)} />
        <Residuals frame={frame} points={points} />
        <Zeros scan={scan} frame={frame} />
      </svg>
      <p className="text-s text-ink-2 flex flex-wrap justify-between gap-x-5 pl-11">
        <span>dial, degrees</span>
        <span>below: {caption}</span>
      </p>
    </div>
  );
}

/** Over a whole turn, which is enough for its ends. */
function sampledCurve(scan: FittedScan): readonly number[] {
  const curve = fittedCurve(scan);
  return Array.from({ length: CURVE_STEPS }, (_, dialDeg) => curve(dialDeg * DENSE_STEP_DEG));
}

function curvePath(scan: FittedScan, { fromDeg, toDeg, x, upper }: ScanFrame): string {
  const curve = fittedCurve(scan);
  return Array.from({ length: CURVE_STEPS + 1 }, (_, k) => {
    const at = fromDeg + (k / CURVE_STEPS) * (toDeg - fromDeg);
    return `${k === 0 ? 'M' : 'L'}${x(at).toFixed(1)} ${upper.y(curve(at)).toFixed(1)}`;
  }).join('');
}

function Axes({ frame }: { readonly frame: ScanFrame }) {
  const { left, right, upper, lower, dialMarks, x } = frame;
  return (
    <>
      {[upper, lower].map((band) => (
        <g key={band.top}>
          {band.marks.map((mark) => (
            <g key={mark}>
              <line x1={left} x2={right} y1={band.y(mark)} y2={band.y(mark)} className="stroke-hair" />
              <line x1={left - 6} x2={left} y1={band.y(mark)} y2={band.y(mark)} className="stroke-ink" />
              <text
                x={left - 10}
                y={band.y(mark) + 4}
                textAnchor="end"
                className="fill-ink-2 text-xs font-mono"
              >
                {withTrueMinus(mark.toFixed(band.decimals))}
              </text>
            </g>
          ))}
          <line x1={left} x2={left} y1={band.top} y2={band.foot} className="stroke-ink" />
          <line x1={left} x2={right} y1={band.y(0)} y2={band.y(0)} className="stroke-ink" />
        </g>
      ))}
      {dialMarks.map((mark) => (
        <g key={mark}>
          <line x1={x(mark)} x2={x(mark)} y1={upper.foot} y2={upper.foot + 5} className="stroke-ink" />
          <text x={x(mark)} y={lower.foot + 18} textAnchor="middle" className="fill-ink-2 text-xs font-mono">
            {engraved(mark)}
          </text>
        </g>
      ))}
    </>
  );
}

/** Room that a label takes beside its line. */
const LABEL_ROOM = 108;

/** The zero as a line of light, and dashed where it may be as well; each is written at its first line. */
function Zeros({ scan, frame }: { readonly scan: FittedScan; readonly frame: ScanFrame }) {
  const { fromDeg, toDeg, x, upper, lower } = frame;
  const marks = zeroMarks(scan, fromDeg, toDeg);
  const firsts = [true, false].map((isNamed) => marks.find((mark) => mark.isNamed === isNamed));
  const labelled = firsts.filter((mark) => mark !== undefined);
  const [one, other] = labelled.map(({ dialDeg }) => x(dialDeg));
  const areClose = one !== undefined && other !== undefined && Math.abs(one - other) < 2 * LABEL_ROOM;
  return (
    <>
      {marks.map((mark) => (
        <path
          key={mark.dialDeg}
          d={`M${x(mark.dialDeg).toFixed(1)} ${upper.top - 16}V${lower.foot}`}
          className="stroke-beam"
          strokeWidth={2}
          strokeDasharray={mark.isNamed ? undefined : '5 4'}
        />
      ))}
      {labelled.map((mark) => (
        <ZeroLabel
          key={mark.dialDeg}
          mark={mark}
          scan={scan}
          frame={frame}
          isLower={areClose && !mark.isNamed}
        />
      ))}
    </>
  );
}

function ZeroLabel(props: {
  readonly mark: ZeroMark;
  readonly scan: FittedScan;
  readonly frame: ScanFrame;
  readonly isLower: boolean;
}) {
  const { mark, scan, frame, isLower } = props;
  const at = frame.x(mark.dialDeg);
  const isLeft = at + LABEL_ROOM > frame.right;
  const value = formatUncertain(engraved(mark.dialDeg), scan.values.offsetSigmaDeg);
  return (
    <text
      x={at + (isLeft ? -7 : 7)}
      y={frame.upper.top - (isLower ? 3 : 18)}
      textAnchor={isLeft ? 'end' : 'start'}
      className={
        mark.isNamed ? 'fill-ink text-[0.9375rem] font-mono font-strong' : 'fill-ink-2 text-s font-mono'
      }
      stroke="var(--paper)"
      strokeWidth={5}
      paintOrder="stroke"
    >
      {mark.isNamed ? value : `or ${value}?`}
    </text>
  );
}
