import { stokesToJones, STOKES_H } from '../../shared/optics/stokes';
import { ellipseOutline } from '../sphere/ellipse-outline';
import { EllipsePath } from '../sphere/EllipsePath';
import {
  ARC,
  arcPoint,
  behindQuarterWave,
  CIRCULAR_AT_DEG,
  quarter,
  radialStroke,
  STATE_ANGLES_DEG,
  ticks,
} from './quarter-arc';
import { wave } from './wave';
import './sign-in-drawing.css';

const STATE_RADIUS = 25.5;
const FAR_RIGHT = 4200;
/**
 * The box ends where the words begin and the beam hangs out of it: a drawing under the words, however empty there, leaves
 * their contrast undecided for a checker.
 */
const BOX_WIDTH = 870;

const FINE_TICKS = ticks(0.2, ARC.radius, (at) => (at % 1 === 0 ? 0 : 9.5));
const DEGREE_TICKS = ticks(1, ARC.radius, (at) => (at % 5 === 0 ? 0 : 19));
const FIVE_TICKS = ticks(5, ARC.radius, (at) => (at % 15 === 0 ? 0 : 32));
const LONG_TICKS = ticks(15, ARC.radius, (at) => (at === CIRCULAR_AT_DEG ? 0 : 45));
const PLATE_TICKS = ticks(1, 395, (at) => (at % 15 === 0 ? -22 : at % 5 === 0 ? -14 : -6));
const PLATE_SPOKES = [15, 30, 60, 75].map((at) => radialStroke(100, 372, at)).join('');
const LEADERS = STATE_ANGLES_DEG.filter((at) => at > 0 && at < 90 && at !== CIRCULAR_AT_DEG)
  .map((at) => radialStroke(ARC.leaderFrom, ARC.leaderTo, at))
  .join('');

const IN = wave(stokesToJones(STOKES_H), {
  fromX: 10,
  toX: 220,
  beamY: ARC.beamY,
  periodX: 140,
  amplitude: 36,
  startPhase: 0.35 * Math.PI,
  spokeEvery: 7,
});
const OUT = wave(stokesToJones(behindQuarterWave(CIRCULAR_AT_DEG)), {
  fromX: 893,
  toX: 2600,
  beamY: ARC.beamY,
  periodX: 140,
  amplitude: 66,
  startPhase: 0,
  spokeEvery: 7,
});

/**
 * What one quarter-wave plate makes of horizontal light as it is turned from level to upright, computed. Decoration beside
 * the words, so hidden from a screen reader. It fills its nearest positioned ancestor, behind what stands there; below
 * 900 px it takes a place of its own in the flow and bleeds off below. `--drawing-unit` is one unit of it on the page.
 */
export function SignInDrawing() {
  const indexTip = ARC.outer + 1;
  return (
    <div className="sign-in-drawing" aria-hidden="true">
      <svg viewBox={`0 0 ${BOX_WIDTH} 900`} focusable="false">
        <g fill="none" stroke="var(--rule)" strokeWidth={0.8}>
          <path d={quarter(ARC.outer)} />
          {ARC.plate.map((radius) => (
            <path key={radius} d={quarter(radius)} strokeWidth={radius === 96 ? 1 : 0.7} />
          ))}
          <path d={PLATE_TICKS} />
          <path d={PLATE_SPOKES} strokeDasharray="1 5.5" />
          <path d={LEADERS} />
        </g>
        <g fill="none" stroke="var(--ink)">
          <path d={quarter(ARC.inner)} strokeWidth={0.8} />
          <path d={quarter(ARC.radius)} strokeWidth={2.2} />
          <path d={FINE_TICKS} stroke="var(--ink-3)" strokeWidth={0.45} />
          <path d={DEGREE_TICKS} strokeWidth={0.8} />
          <path d={FIVE_TICKS} strokeWidth={1.1} />
          <path d={LONG_TICKS} strokeWidth={1.9} />
          <path d={radialStroke(0, 617, 90)} strokeWidth={0.9} />
          <path
            d={radialStroke(0, 417, CIRCULAR_AT_DEG) + radialStroke(486, 602, CIRCULAR_AT_DEG)}
            strokeWidth={2.4}
          />
        </g>
        <Numbers />
        <path d={`M-${FAR_RIGHT} ${ARC.beamY}H${FAR_RIGHT}`} stroke="var(--beam)" strokeWidth={2.6} />
        <g fill="none" stroke="var(--hv)">
          <path d={IN.frontSpokes + IN.backSpokes} strokeWidth={0.8} />
          <path d={IN.front + IN.back} strokeWidth={1.8} strokeLinecap="round" />
        </g>
        <g fill="none" stroke="var(--rl)">
          <path d={OUT.backSpokes} strokeWidth={0.6} strokeOpacity={0.5} />
          <path d={OUT.back} strokeWidth={1.2} strokeOpacity={0.8} strokeLinecap="round" />
          <path d={OUT.frontSpokes} strokeWidth={0.8} strokeOpacity={0.8} />
          <path d={OUT.front} strokeWidth={2.6} strokeLinecap="round" />
        </g>
        <circle
          cx={ARC.originX}
          cy={ARC.beamY}
          r={9}
          fill="var(--lit)"
          stroke="var(--ink)"
          strokeWidth={1.6}
        />
        <path
          transform={`translate(${arcPoint(indexTip, 45).x} ${arcPoint(indexTip, 45).y}) rotate(-45)`}
          d="M0 0L22 -12V12Z"
          fill="var(--lit)"
          stroke="var(--ink)"
          strokeWidth={1.2}
          strokeLinejoin="round"
        />
        {STATE_ANGLES_DEG.map((at) => (
          <State key={at} fastAxisDeg={at} />
        ))}
        <Words />
      </svg>
    </div>
  );
}

function State({ fastAxisDeg }: { readonly fastAxisDeg: number }) {
  const { x, y } = arcPoint(ARC.states, fastAxisDeg);
  const outline = ellipseOutline(behindQuarterWave(fastAxisDeg));
  const circular = fastAxisDeg === CIRCULAR_AT_DEG;
  const stroke = circular ? 'var(--rl)' : outline.sense === 0 ? 'var(--hv)' : 'var(--ink)';
  return (
    <g transform={`translate(${x.toFixed(1)} ${y.toFixed(1)})`}>
      <EllipsePath
        outline={outline}
        scalePx={STATE_RADIUS}
        widthPx={circular || outline.sense === 0 ? 2.4 : 1.5}
        headPx={7.5}
        stroke={stroke}
      />
    </g>
  );
}

function Numbers() {
  return (
    <g textAnchor="middle">
      {Array.from({ length: 19 }, (_, k) => k * 5).map((at) => {
        const named = at % 15 === 0;
        // The index stands under 45; 0 keeps clear of the beam.
        const { x, y } = arcPoint(at === CIRCULAR_AT_DEG ? 650 : ARC.numbers, at === 0 ? 1.5 : at);
        return (
          <text
            key={at}
            className={named ? 'font-mono' : 'font-mono sign-in-drawing-fine'}
            transform={`translate(${x.toFixed(1)} ${y.toFixed(1)}) rotate(${90 - at})`}
            dy={named ? 5 : 4}
            fontSize={named ? 18 : 11.5}
            fill={named ? 'var(--ink)' : 'var(--ink-3)'}
          >
            {at}
          </text>
        );
      })}
    </g>
  );
}

function Words() {
  const axis = arcPoint(212, CIRCULAR_AT_DEG);
  return (
    <g fontSize={13.5} fill="var(--ink-2)" className="sign-in-drawing-words">
      <text transform={`translate(${axis.x} ${axis.y}) rotate(-45)`} dy={-9} textAnchor="middle">
        fast axis
      </text>
      <text x={24} y={785}>
        horizontal in
      </text>
      <text x={254} y={745}>
        every state that one quarter-wave plate makes of it, as the receiver sees it
      </text>
      <text x={886} y={801}>
        circular out, behind a quarter-wave plate at 45°
      </text>
    </g>
  );
}
