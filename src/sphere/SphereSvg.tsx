import { Fragment, useId } from 'react';
import { limbTicks, type PagePoint } from './limb';
import type { SceneLine, SceneTicks, SphereScene } from './scene';
import { SphereMarks } from './SphereMarks';
import { DOTS_PX, LIMB, SHADE, STROKES } from './strokes';
import { type Placement, project, splitAtLimb, type ViewFrame } from './view';

interface Props {
  readonly scene: SphereScene;
  readonly frame: ViewFrame;
  readonly place: Placement;
}

/** The whole sphere without WebGL: the same scene, places and line weights; what is hidden is dotted. */
export function SphereSvg({ scene, frame, place }: Props) {
  const shadeId = useId();
  const { centreX, centreY, radius } = place;
  const runs = scene.lines.flatMap((line) =>
    splitAtLimb(line.points, frame).map((run, index) => ({ line, run, id: `${line.id}/${index}` })),
  );
  const back = runs.filter(({ run }) => !run.front);
  const front = runs.filter(({ run }) => run.front);
  return (
    <svg
      className="sphere-drawing"
      width={place.width}
      height={place.height}
      viewBox={`0 0 ${place.width} ${place.height}`}
      aria-hidden="true"
      focusable="false"
    >
      <defs>
        <radialGradient
          id={shadeId}
          gradientUnits="userSpaceOnUse"
          cx={centreX + SHADE.centreX * radius}
          cy={centreY + SHADE.centreY * radius}
          r={SHADE.radius * radius}
        >
          <stop offset={SHADE.from} stopColor="var(--glass)" />
          <stop offset={1} stopColor="var(--wash)" />
        </radialGradient>
      </defs>
      <circle cx={centreX} cy={centreY} r={radius} fill={`url(#${shadeId})`} />
      {back.map(({ line, run, id }) => {
        const stroke = STROKES[line.role];
        if (stroke.backOpacity === null) return null;
        return (
          <path
            key={id}
            d={pathData(run.points, place)}
            fill="none"
            stroke={`var(--${stroke.token})`}
            strokeWidth={stroke.widthPx}
            strokeOpacity={stroke.backOpacity}
            strokeLinejoin="round"
            strokeDasharray={stroke.backDotted ? `${DOTS_PX.mark} ${DOTS_PX.gap}` : undefined}
          />
        );
      })}
      {scene.ticks.map((ticks) => (
        <TickPath key={ticks.id} ticks={ticks} frame={frame} place={place} side="back" />
      ))}
      {front.map(({ line, run, id }) => (
        <FrontLine key={id} line={line} d={pathData(run.points, place)} />
      ))}
      {scene.ticks.map((ticks) => (
        <TickPath key={ticks.id} ticks={ticks} frame={frame} place={place} side="front" />
      ))}
      <LimbRing place={place} />
      <SphereMarks scene={scene} frame={frame} place={place} />
    </svg>
  );
}

function FrontLine({ line, d }: { readonly line: SceneLine; readonly d: string }) {
  const stroke = STROKES[line.role];
  return (
    <Fragment>
      {stroke.haloPx > 0 && (
        <path
          d={d}
          fill="none"
          stroke="var(--glass)"
          strokeWidth={stroke.widthPx + 2 * stroke.haloPx}
          strokeLinejoin="round"
        />
      )}
      <path
        d={d}
        data-line={line.id}
        fill="none"
        stroke={`var(--${stroke.token})`}
        strokeWidth={stroke.widthPx}
        strokeOpacity={stroke.frontOpacity}
        strokeLinejoin="round"
        strokeLinecap={stroke.haloPx > 0 ? 'round' : 'butt'}
      />
    </Fragment>
  );
}

function TickPath({
  ticks,
  frame,
  place,
  side,
}: Omit<Props, 'scene'> & { readonly ticks: SceneTicks; readonly side: 'front' | 'back' }) {
  const stroke = STROKES[ticks.role];
  const opacity = side === 'front' ? stroke.frontOpacity : stroke.backOpacity;
  if (opacity === null) return null;
  const d = ticks.segments
    .map((segment) => segment.map((point) => project(point, frame)))
    // A tick belongs to the side where its foot stands on the line.
    .filter(([foot]) => foot !== undefined && foot.depth >= 0 === (side === 'front'))
    .map((segment) => pathData(segment, place))
    .join('');
  if (d === '') return null;
  return (
    <path
      d={d}
      fill="none"
      stroke={`var(--${stroke.token})`}
      strokeWidth={stroke.widthPx}
      strokeOpacity={opacity}
    />
  );
}

/** The ring around the drawing: it stays with the page and is where the view is taken hold of. */
function LimbRing({ place }: { readonly place: Placement }) {
  const { centreX, centreY, radius } = place;
  const ticks = limbTicks()
    .map(({ from, to }) => pathData([from, to], place))
    .join('');
  return (
    <g fill="none">
      <circle cx={centreX} cy={centreY} r={radius} stroke="var(--ink)" strokeWidth={1} />
      <circle cx={centreX} cy={centreY} r={radius * LIMB.ringRadius} stroke="var(--rule)" strokeWidth={0.8} />
      <path d={ticks} stroke="var(--rule)" strokeWidth={0.8} />
    </g>
  );
}

function pathData(points: readonly PagePoint[], place: Placement): string {
  return points
    .map(({ x, y }, index) => {
      const px = (place.centreX + x * place.radius).toFixed(2);
      const py = (place.centreY + y * place.radius).toFixed(2);
      return `${index === 0 ? 'M' : 'L'}${px} ${py}`;
    })
    .join('');
}
