import { memo } from 'react';
import type { Convention } from '../../../../shared/optics/convention';
import { fastAxisFromDial } from '../../../../shared/optics/dial';
import type { Stokes } from '../../../../shared/optics/stokes';
import { ellipseOf } from '../../../../shared/optics/ellipse';
import { degrees, toDegrees } from '../../../../shared/optics/units';
import { dialScaleOf, usedRetardance } from '../../../../shared/protocol/solving-plates';
import type { Bench } from '../../../../shared/schemas/benches';
import type { Plate } from '../../../../shared/schemas/cabinet';
import type { DraftTarget } from '../../../../shared/schemas/protocols';
import { BeamLineStage, type StagePlate } from '../../../stage';
import { standingAt } from './dialled-problem';
import { Readout } from './Readout';
import type { RowView } from './row-view';
import { useDesignerView } from './view-store';

interface SelectedStageProps {
  readonly bench: Bench;
  /** The light before the first plate: the bench's own, or one that a unitary is followed with. */
  readonly input: Stokes;
  /** What it is called where it isn't the bench's own. */
  readonly followed: string | null;
  readonly target: DraftTarget;
  readonly view: Extract<RowView, { status: 'solved' }>;
  readonly toleranceInfidelity: number;
  readonly convention: Convention;
}

function stagePlate(plate: Plate, bench: Bench, dialDeg: number, solutionDialDeg: number): StagePlate {
  const scale = dialScaleOf(plate);
  return {
    id: plate.id,
    name: plate.name,
    kind: plate.kind,
    scale,
    retardanceDeg: usedRetardance(plate, bench).retardanceDeg,
    retardanceSigmaDeg: plate.calibration.retardanceSigmaDeg,
    dialDeg,
    fastAxisDeg: fastAxisFromDial(degrees(dialDeg), scale),
    solutionDialDeg,
  };
}

/** The bench with the selected row's angles on it, or with a plate turned by hand to see what that does. */
export const SelectedStage = memo(function SelectedStage(props: SelectedStageProps) {
  const { bench, input, followed, target, view, toleranceInfidelity, convention } = props;
  const { handDialsDeg, turnByHand, listSolutions, solutionsOfId } = useDesignerView();
  const solutionDials = view.solution.dialsDeg;
  const dialsDeg = handDialsDeg?.length === bench.plates.length ? handDialsDeg : solutionDials;
  const reached = standingAt({ bench, input, reading: view.reading, dialsDeg });
  return (
    <BeamLineStage
      stage={{
        wavelengthNm: bench.wavelengthNm,
        polariser: {
          axisDeg: toDegrees(ellipseOf(input).azimuthRad),
          axisSigmaDeg: followed === null ? bench.polariserSigmaDeg : null,
        },
        plates: bench.plates.map((plate, index) =>
          stagePlate(plate, bench, dialsDeg[index] ?? 0, solutionDials[index] ?? 0),
        ),
        before: [input, ...reached.statesAfter.slice(0, -1)],
        output: {
          label: followed === null ? target.label : `${target.label} of ${followed}`,
          state: reached.output,
        },
        convention,
      }}
      onDial={(index, dialDeg) =>
        turnByHand(dialsDeg.map((dial, place) => (place === index ? dialDeg : dial)))
      }
      onBackToSolution={() => turnByHand(null)}
    >
      <Readout
        label={target.label}
        view={view}
        plates={bench.plates}
        toleranceInfidelity={toleranceInfidelity}
        byHandInfidelity={handDialsDeg === null ? null : reached.infidelity}
        onListSolutions={() => listSolutions(solutionsOfId === target.id ? null : target.id)}
      />
    </BeamLineStage>
  );
});
