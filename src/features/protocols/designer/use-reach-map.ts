import { useEffect, useMemo } from 'react';
import type { ReachMap } from '../../../../shared/optics/solver/reach-map';
import type { Stokes } from '../../../../shared/optics/stokes';
import { toRadians } from '../../../../shared/optics/units';
import { sincos } from '../../../../shared/optics/elementary';
import type { SphereInput, SpherePlate } from '../../../sphere';
import { useStudy } from '../../../workers/use-study';

/** Fine enough for the holes that plates a degree or two off leave round the poles. */
const stepDeg = 2;

type Reach = NonNullable<SphereInput['reach']>;

function asReach({ rows }: ReachMap): Reach {
  return {
    stepDeg,
    cells: rows.flatMap(({ cells }) =>
      cells.map(({ latitudeDeg, longitudeDeg, settings }) => {
        const latitude = sincos(toRadians(latitudeDeg));
        const longitude = sincos(toRadians(longitudeDeg));
        const centre: Stokes = [latitude.cos * longitude.cos, latitude.cos * longitude.sin, latitude.sin];
        return { centre, latitudeDeg, longitudeDeg, count: settings };
      }),
    ),
  };
}

interface Asked {
  readonly input: Stokes;
  readonly plates: readonly SpherePlate[];
}

/** What two plates can and can't make of their input, worked out aside while somebody looks at it; null asks for nothing. */
export function useReachMap(asked: Asked | null): {
  readonly map: Reach | null;
  /** From 0 to 1 while it is worked out. */
  readonly progress: number | null;
} {
  const { study, start, cancel } = useStudy('reach');
  const [first, second, third] = asked?.plates ?? [];
  const pair =
    first === undefined || second === undefined || third !== undefined
      ? null
      : `${first.retardanceDeg} ${second.retardanceDeg}`;
  const question = asked === null || pair === null ? null : `${asked.input.join()} ${pair}`;
  useEffect(() => {
    if (asked === null || first === undefined || second === undefined || question === null) return;
    start({
      kind: 'reach',
      input: asked.input,
      retardancesDeg: [first.retardanceDeg, second.retardanceDeg],
      stepDeg,
    });
    return cancel;
    // eslint-disable-next-line react-hooks/exhaustive-deps -- `question` is the text of all that the map depends on; the objects are new at every turn of a plate
  }, [question, start, cancel]);
  const map = useMemo(
    () => (study.state === 'done' && question !== null ? asReach(study.result.map) : null),
    [study, question],
  );
  return { map, progress: study.state === 'working' && question !== null ? study.share : null };
}
