import type { CabinetPlate } from '../../../shared/schemas/cabinet';
import { AgeRing } from '../../components/AgeRing';
import { calibrationAge, restingAxisDeg } from '../cabinet';
import { useLab } from '../labs';

/** A plate as a small mount with its age; dashed while nobody knows what sits there. */
export function PlateSign(props: {
  readonly plate: CabinetPlate | undefined;
  readonly radius: number;
  readonly now: Date;
}) {
  const { plate, radius, now } = props;
  const { lab } = useLab();
  const calibration = plate?.calibration ?? null;
  const age =
    calibration === null ? null : calibrationAge(calibration.measuredAt, lab.calibrationDueDays, now);
  return (
    <AgeRing
      radius={radius}
      fastAxisDeg={plate === undefined ? null : restingAxisDeg(plate)}
      ageDays={age?.ageDays ?? null}
      dueDays={lab.calibrationDueDays}
      unsettled={calibration?.openQuestions.includes('axis') ?? false}
    />
  );
}
