import type { Stokes } from '../../shared/optics/stokes';
import { sameState } from './same-state';
import type { SceneLabel, SceneMark, SpherePointInput } from './scene';

/** More names than this would cover the states they name. */
export const MOST_NAMED_POINTS = 12;

/** A dot for each state of a set, named while there are few; what a basis letter already says isn't said twice. */
export function pointMarks(
  points: readonly SpherePointInput[],
  basis: readonly { readonly letter: string; readonly state: Stokes }[],
): { marks: readonly SceneMark[]; labels: readonly SceneLabel[] } {
  const lettered = ({ label, state }: SpherePointInput) =>
    basis.some((one) => one.letter === label && sameState(one.state, state));
  return {
    marks: points.map(({ state }, index): SceneMark => ({ id: `point-${index}`, kind: 'point', at: state })),
    labels:
      points.length > MOST_NAMED_POINTS
        ? []
        : points.flatMap((point, index): SceneLabel[] =>
            lettered(point)
              ? []
              : [{ id: `point-${index}`, role: 'point', text: point.label, at: [point.state] }],
          ),
  };
}
