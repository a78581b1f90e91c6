import { useMemo, useState } from 'react';
import type { Convention } from '../../../../shared/optics/convention';
import { fastAxisFromDial } from '../../../../shared/optics/dial';
import type { Stokes } from '../../../../shared/optics/stokes';
import { degrees } from '../../../../shared/optics/units';
import { dialScaleOf } from '../../../../shared/protocol/solve-row';
import type { Bench } from '../../../../shared/schemas/benches';
import type { DraftTarget } from '../../../../shared/schemas/protocols';
import { createSphereViewStore, FieldPlot, Sphere, type SphereInput } from '../../../sphere';
import type { RowView } from './row-view';
import { reachedState } from './dialled-problem';
import { useDesignerView } from './view-store';

interface SelectedFiguresProps {
  readonly bench: Bench;
  readonly input: Stokes;
  readonly target: DraftTarget;
  readonly view: Extract<RowView, { status: 'solved' }>;
  readonly convention: Convention;
}

/** The path of the light on the sphere, and its field behind the last plate, for the dials as they stand on the stage. */
export function SelectedFigures({ bench, input, target, view, convention }: SelectedFiguresProps) {
  const handDialsDeg = useDesignerView((state) => state.handDialsDeg);
  const dialsDeg = handDialsDeg ?? view.solution.dialsDeg;
  const [sphereView] = useState(() => createSphereViewStore());
  const scene = useMemo(
    (): SphereInput => ({
      start: input,
      plates: bench.plates.map((plate, index) => ({
        name: plate.name,
        retardanceDeg: plate.calibration.retardanceDeg,
        fastAxisDeg: fastAxisFromDial(degrees(dialsDeg[index] ?? 0), dialScaleOf(plate)),
      })),
      target: { label: target.label, state: view.reading.stokes },
      convention,
    }),
    [input, bench, dialsDeg, target.label, view.reading.stokes, convention],
  );
  const reached = reachedState({ bench, input, target: view.reading.stokes, dialsDeg });
  return (
    <div className="min-w-0">
      <Sphere input={scene} view={sphereView} />
      <div className="mt-3 border-t border-hair pt-3">
        <FieldPlot state={reached.stokes} label={target.label} />
      </div>
    </div>
  );
}
