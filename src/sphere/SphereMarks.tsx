import { LABEL_TYPE, placeLabels, type PlacedLabel } from './labels';
import type { BasisPair, LabelRole, SceneHead, SceneMark, SphereScene } from './scene';
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

const BASIS_COLOUR: Readonly<Record<BasisPair, string>> = {
  hv: 'var(--hv)',
  da: 'var(--da)',
  rl: 'var(--rl)',
};

function MarkShape({ mark, front }: { readonly mark: SceneMark; readonly front: boolean }) {
  switch (mark.kind) {
    case 'basis': {
      const colour = BASIS_COLOUR[mark.pair];
      // The hollow shapes are drawn smaller by half their edge, so that both of a pair are the same size.
      const style = mark.filled ? { fill: colour } : { fill: 'var(--glass)', stroke: colour, strokeWidth: 2 };
      const half = mark.filled ? 5.5 : 4.5;
      if (mark.pair === 'hv')
        return <rect x={-half} y={-half} width={2 * half} height={2 * half} {...style} />;
      if (mark.pair === 'da') {
        const reach = mark.filled ? 7.2 : 6.2;
        return <path d={`M0 ${-reach} L${reach} 0 L0 ${reach} L${-reach} 0 Z`} {...style} />;
      }
      return <circle r={half} {...style} />;
    }
    case 'axis': {
      const colour = mark.last ? 'var(--beam)' : 'var(--ink-2)';
      return (
        <g stroke={colour} fill="none" strokeWidth={1.2}>
          <circle r={9.2} strokeDasharray="1.6 2" strokeWidth={1} />
          <path d="M-6 0 H6 M0 -6 V6" />
        </g>
      );
    }
    case 'between':
      return <circle r={4} fill="var(--glass)" stroke="var(--ink)" strokeWidth={1.4} />;
    case 'target':
      return (
        <g stroke="var(--ink)" strokeWidth={1.4}>
          <circle r={10} fill="var(--glass)" />
          <path d="M0 -9.5 V-14 M0 9.5 V14 M-9.5 0 H-14 M9.5 0 H14" />
        </g>
      );
    case 'reached':
      return (
        <circle
          r={5.6}
          fill="var(--lit)"
          stroke="var(--ink)"
          strokeWidth={1.2}
          strokeDasharray={front ? undefined : '2 1.6'}
        />
      );
  }
}

const LABEL_WEIGHT: Readonly<Record<LabelRole, number>> = {
  basis: 650,
  target: 650,
  turn: 650,
  'last-turn': 650,
  axis: 400,
  degrees: 400,
};

function labelColour({ role, front }: PlacedLabel): string {
  if (role === 'degrees' || role === 'axis') return front ? 'var(--ink-2)' : 'var(--ink-3)';
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
      fontSize={LABEL_TYPE[label.role].sizePx}
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
