import { placeLabels, type PlacedLabel } from './labels';
import { Flag } from './Flag';
import { MarkShape } from './MarkShape';
import type { LabelRole, SceneHead, SphereScene } from './scene';
import { type Placement, project, type ViewFrame } from './view';

interface Props {
  readonly scene: SphereScene;
  readonly frame: ViewFrame;
  readonly place: Placement;
}

/**
 * The signs and words of the sphere, which keep their size and face the reader. Both renderers lay this same group over
 * their lines, so a mark stands at the same place in either.
 */
export function SphereMarks({ scene, frame, place }: Props) {
  const shown = scene.marks.map((mark) => {
    const { x, y, depth } = project(mark.at, frame);
    return {
      mark,
      x: place.centreX + x * place.radius,
      y: place.centreY + y * place.radius,
      front: depth >= 0,
    };
  });
  return (
    <g>
      {scene.heads.map((head) => (
        <Head key={head.id} head={head} frame={frame} place={place} />
      ))}
      {[...shown.filter(({ front }) => !front), ...shown.filter(({ front }) => front)].map(
        ({ mark, x, y, front }) => (
          <g
            key={mark.id}
            data-mark={mark.id}
            transform={`translate(${x.toFixed(2)} ${y.toFixed(2)})`}
            opacity={front ? 1 : 0.45}
          >
            <MarkShape mark={mark} front={front} />
          </g>
        ),
      )}
      {scene.flags.map((flag) => (
        <Flag key={flag.id} flag={flag} frame={frame} place={place} />
      ))}
      {placeLabels(scene, frame, place).map((label) => (
        <Label key={label.id} label={label} place={place} />
      ))}
    </g>
  );
}

/** Half length and half width of a full arrowhead. */
const HEAD_PX = { half: 6.5, halfWidth: 5 } as const;

function Head({ head, frame, place }: Omit<Props, 'scene'> & { readonly head: SceneHead }) {
  const at = project(head.at, frame);
  const towards = project(head.towards, frame);
  const directionDeg = (Math.atan2(towards.y, towards.x) * 180) / Math.PI;
  const x = place.centreX + at.x * place.radius;
  const y = place.centreY + at.y * place.radius;
  const [half, halfWidth] = [HEAD_PX.half * head.size, HEAD_PX.halfWidth * head.size];
  return (
    <path
      data-head={head.id}
      transform={`translate(${x.toFixed(2)} ${y.toFixed(2)}) rotate(${directionDeg.toFixed(2)})`}
      d={`M${half} 0 L${-half} ${halfWidth} V${-halfWidth} Z`}
      fill={head.last ? 'var(--beam)' : 'var(--ink)'}
      opacity={at.depth >= 0 ? 1 : 0.45}
    />
  );
}

const LABEL_WEIGHT: Readonly<Record<LabelRole, number>> = {
  basis: 650,
  target: 650,
  image: 650,
  point: 400,
  turn: 650,
  'last-turn': 650,
  axis: 400,
  degrees: 400,
};

function labelColour({ role, front }: PlacedLabel): string {
  if (role === 'degrees' || role === 'axis' || role === 'point')
    return front ? 'var(--ink-2)' : 'var(--ink-3)';
  if (role === 'last-turn') return 'var(--beam-text)';
  return front ? 'var(--ink)' : 'var(--ink-3)';
}

function Label({ label, place }: { readonly label: PlacedLabel; readonly place: Placement }) {
  const onBody = Math.hypot(label.x - place.centreX, label.y - place.centreY) < place.radius;
  return (
    <text
      data-label={label.id}
      x={label.x.toFixed(2)}
      y={label.y.toFixed(2)}
      dy="0.35em"
      textAnchor="middle"
      className={label.role === 'degrees' ? 'sphere-label font-mono' : 'sphere-label'}
      fontSize={label.sizePx}
      fontWeight={LABEL_WEIGHT[label.role]}
      fill={labelColour(label)}
      stroke={onBody ? 'var(--glass)' : 'var(--paper)'}
      strokeWidth={3}
      strokeLinejoin="round"
      paintOrder="stroke"
    >
      {label.text}
    </text>
  );
}
