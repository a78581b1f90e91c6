import { fieldAt, radians, type Stokes, stokesToJones } from '../../../shared/optics';
import { arrowhead } from '../../components/polar';
import { ellipseOutline, type EllipseOutline } from '../../sphere/ellipse-outline';
import { EllipsePath } from '../../sphere/EllipsePath';
import { type FieldMoment, fieldMoments } from './field-times';
import { lightInWords } from './light-words';

const SIZE = 256;
const HALF = SIZE / 2;
const SCALE = 88;
const LABEL_AWAY = 14;
const OUTLINE_STEPS = 120;
const HEAD = 14;
/** Between two marked moments, so that no arrowhead lies on a point. */
const HEADS_AT = [1.5, 5.5] as const;
/** Moments whose points lie nearer than this, in px, share one label. */
const SHARED_WITHIN = 5;

interface MarkedPoint {
  readonly x: number;
  readonly y: number;
  readonly eighths: readonly number[];
}

/** The moments as points in px, y downwards; those that fall on one place are one point. */
function markedPoints(moments: readonly FieldMoment[]): readonly MarkedPoint[] {
  const points: MarkedPoint[] = [];
  for (const { h, v, eighths } of moments) {
    const [x, y] = [h * SCALE, -v * SCALE];
    const at = points.findIndex((point) => Math.hypot(point.x - x, point.y - y) < SHARED_WITHIN);
    const there = points[at];
    if (there === undefined) points.push({ x, y, eighths: [eighths] });
    else points[at] = { ...there, eighths: [...there.eighths, eighths] };
  }
  return points;
}

function pointAt(stokes: Stokes, phaseRad: number): readonly [number, number] {
  const { h, v } = fieldAt(stokesToJones(stokes), radians(phaseRad));
  return [h * SCALE, -v * SCALE];
}

function outlinePath(stokes: Stokes): string {
  const points = Array.from({ length: OUTLINE_STEPS }, (_, k) =>
    pointAt(stokes, (2 * Math.PI * k) / OUTLINE_STEPS),
  );
  return `M${points.map(([x, y]) => `${x.toFixed(2)} ${y.toFixed(2)}`).join('L')}Z`;
}

/** An arrowhead on the outline, the way that the field goes at that moment: the sense of its turn. */
function headPath(stokes: Stokes, eighths: number): string {
  const phase = (2 * Math.PI * eighths) / 8;
  const at = pointAt(stokes, phase);
  // A quarter period later the field is what its rate of change is now.
  const [alongX, alongY] = pointAt(stokes, phase + Math.PI / 2);
  return arrowhead(at, (Math.atan2(-alongY, alongX) * 180) / Math.PI, HEAD, HEAD * 0.8);
}

/** Away from the outline at a point, so that the two sides of a thin ellipse have their numbers on either side. */
function outward(point: MarkedPoint, { azimuthDeg, major, minor, sense }: EllipseOutline) {
  const turn = (azimuthDeg * Math.PI) / 180;
  const [cos, sin] = [Math.cos(turn), Math.sin(turn)];
  const along = (point.x * cos - point.y * sin) / SCALE;
  const across = (-point.x * sin - point.y * cos) / SCALE;
  const [nAlong, nAcross] = sense === 0 ? [0, 1] : [along / major ** 2, across / minor ** 2];
  const length = Math.hypot(nAlong, nAcross);
  const [a, b] = length === 0 ? [0, 1] : [nAlong / length, nAcross / length];
  return { x: a * cos - b * sin, y: -(a * sin + b * cos) };
}

/** What the tip of the field draws, as the receiver sees it, with eight numbered moments of one period on it. */
export function EllipseInTime({ stokes }: { readonly stokes: Stokes }) {
  const outline = ellipseOutline(stokes);
  const moments = fieldMoments(stokes);
  const [start] = moments;
  return (
    <svg
      role="img"
      aria-label={`The field as the receiver sees it: ${lightInWords(stokes)}.`}
      viewBox={`${-HALF} ${-HALF} ${SIZE} ${SIZE}`}
      width={SIZE}
      height={SIZE}
      className="block max-w-full"
    >
      <circle r={HALF - 1} className="fill-glass stroke-hair" />
      <path
        d={`M${-HALF} 0H${HALF}M0 ${-HALF}V${HALF}`}
        className="stroke-rule"
        strokeWidth="0.9"
        strokeDasharray="1 4"
      />
      <g className="fill-ink" fontSize="12">
        <text x={HALF - 16} y={-6}>
          H
        </text>
        <text x={7} y={-HALF + 18}>
          V
        </text>
      </g>
      {outline.sense === 0 ? (
        <EllipsePath outline={outline} scalePx={SCALE} widthPx={2.6} headPx={0} />
      ) : (
        <>
          <path
            d={outlinePath(stokes)}
            className="fill-lit stroke-ink dark-room:fill-none"
            strokeWidth="2.6"
          />
          {HEADS_AT.map((eighths) => (
            <path key={eighths} d={headPath(stokes, eighths)} className="fill-ink" />
          ))}
          {start !== undefined && (
            <path
              d={`M0 0L${start.h * SCALE} ${-start.v * SCALE}`}
              className="stroke-on-lit dark-room:stroke-ink"
              strokeWidth="1.2"
              strokeDasharray="5 4"
            />
          )}
        </>
      )}
      {markedPoints(moments).map((point) => {
        const away = outward(point, outline);
        return (
          <g key={point.eighths.join()}>
            <circle cx={point.x} cy={point.y} r="2.6" className="fill-paper stroke-ink" strokeWidth="1.2" />
            <text
              x={point.x + away.x * LABEL_AWAY}
              y={point.y + away.y * LABEL_AWAY + 4}
              textAnchor="middle"
              fontSize="12"
              className="fill-ink font-mono"
            >
              {point.eighths.join(', ')}
            </text>
          </g>
        );
      })}
    </svg>
  );
}
