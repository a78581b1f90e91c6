import { memo, useMemo, useState } from 'react';
import type { Convention } from '../../../../shared/optics/convention';
import { fastAxisFromDial } from '../../../../shared/optics/dial';
import type { Stokes } from '../../../../shared/optics/stokes';
import { degrees } from '../../../../shared/optics/units';
import { dialScaleOf, usedRetardance } from '../../../../shared/protocol/solving-plates';
import type { Bench } from '../../../../shared/schemas/benches';
import type { DraftTarget } from '../../../../shared/schemas/protocols';
import { createSphereViewStore, FieldPlot, Sphere, type SphereInput } from '../../../sphere';
import type { RowView } from './row-view';
import { standingAt } from './dialled-problem';
import { imageOf, sixImages } from './followed-light';
import { SphereChoices } from './SphereChoices';
import { useReachMap } from './use-reach-map';
import { useDesignerView } from './view-store';

interface SelectedFiguresProps {
  readonly bench: Bench;
  readonly input: Stokes;
  readonly followed: string | null;
  readonly target: DraftTarget;
  readonly view: Extract<RowView, { status: 'solved' }>;
  readonly convention: Convention;
}

/** The path of the light on the sphere, and its field behind the last plate, for the dials as they stand on the stage. */
export const SelectedFigures = memo(function SelectedFigures(props: SelectedFiguresProps) {
  const { bench, input, followed, target, view, convention } = props;
  const { handDialsDeg, overlay } = useDesignerView();
  const dialsDeg = handDialsDeg?.length === bench.plates.length ? handDialsDeg : view.solution.dialsDeg;
  const { reading } = view;
  const [sphereView] = useState(() => createSphereViewStore());
  const plates = useMemo(
    () =>
      bench.plates.map((plate, index) => ({
        name: plate.name,
        retardanceDeg: usedRetardance(plate, bench).retardanceDeg,
        fastAxisDeg: fastAxisFromDial(degrees(dialsDeg[index] ?? 0), dialScaleOf(plate)),
      })),
    [bench, dialsDeg],
  );
  const reach = useReachMap(overlay === 'reach' && reading.kind === 'state' ? { input, plates } : null);
  const label = followed === null ? target.label : `${target.label} of ${followed}`;
  const scene = useMemo(
    (): SphereInput => ({
      start: input,
      plates,
      target: {
        label,
        state: reading.kind === 'state' ? reading.stokes : imageOf(reading.quaternion, input),
      },
      convention,
      ...(overlay === 'images' && reading.kind === 'unitary'
        ? { images: sixImages(reading.quaternion, plates, convention) }
        : {}),
      ...(overlay === 'phase' ? { phase: true } : {}),
      ...(reach.map === null ? {} : { reach: reach.map }),
    }),
    [input, plates, label, reading, convention, overlay, reach.map],
  );
  const standing = standingAt({ bench, input, reading, dialsDeg });
  return (
    <div className="min-w-0">
      <SphereChoices kind={reading.kind} plateCount={plates.length} progress={reach.progress} />
      <Sphere input={scene} view={sphereView} />
      <div className="mt-3 border-t border-hair pt-3">
        <FieldPlot state={standing.output} label={label} />
      </div>
    </div>
  );
});
