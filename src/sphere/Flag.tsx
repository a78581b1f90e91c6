import type { SceneFlag } from './scene';
import { type Placement, project, type ViewFrame } from './view';
import type { Vec3 } from './vec';

interface Props {
  readonly flag: SceneFlag;
  readonly frame: ViewFrame;
  readonly place: Placement;
}

/** A pole with its pennant as it stands on the sphere: the hairline is phase 0, an open ring on the pole no phase at all. */
export function Flag({ flag, frame, place }: Props) {
  const at = (point: Vec3): string => {
    const { x, y } = project(point, frame);
    return `${(place.centreX + x * place.radius).toFixed(2)} ${(place.centreY + y * place.radius).toFixed(2)}`;
  };
  const [foot, top, hoist] = [at(flag.foot), at(flag.top), at(flag.hoist)];
  const front = project(flag.foot, frame).depth >= 0;
  const [ringX, ringY] = top.split(' ');
  return (
    <g data-flag={flag.id} opacity={front ? 1 : 0.35} strokeLinejoin="round" fill="none">
      {/* An edge of the body's colour keeps the flag apart from the path that it stands on. */}
      <path d={`M${foot}L${top}`} stroke="var(--glass)" strokeWidth={3.2} />
      <path d={`M${foot}L${top}`} stroke="var(--ink-2)" strokeWidth={1.1} />
      {flag.zero !== undefined && (
        <path data-flag-zero="" d={`M${top}L${at(flag.zero)}`} stroke="var(--ink-2)" strokeWidth={0.9} />
      )}
      {flag.tip === undefined ? (
        <circle cx={ringX} cy={ringY} r={3} fill="var(--glass)" stroke="var(--ink)" strokeWidth={1.2} />
      ) : (
        <path
          data-flag-tip=""
          d={`M${top}L${at(flag.tip)}L${hoist}Z`}
          fill={flag.last ? 'var(--lit)' : 'var(--ink)'}
          stroke="var(--ink)"
          strokeWidth={1.1}
        />
      )}
    </g>
  );
}
