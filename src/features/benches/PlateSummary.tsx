import type { CabinetPlate } from '../../../shared/schemas/cabinet';
import { Quantity } from '../../components/NumberText';
import { formatUncertain } from '../../lib/format';
import { kindNames } from '../cabinet';

/** "half-wave plate, 179.2(3)° at 810 nm, in M03": what tells two plates apart. */
export function PlateSummary({ plate }: { readonly plate: CabinetPlate }) {
  const { kind, designWavelengthNm, calibration, seat } = plate;
  return (
    <>
      {kindNames[kind]},{' '}
      {calibration === null ? (
        <>
          made for <Quantity text={String(designWavelengthNm)} unit="nm" />
        </>
      ) : (
        <>
          <span className="whitespace-nowrap">
            {formatUncertain(calibration.retardanceDeg, calibration.retardanceSigmaDeg)}°
          </span>{' '}
          at <Quantity text={String(calibration.wavelengthNm)} unit="nm" />
        </>
      )}
      {seat !== null && `, in ${seat.mount.name}`}
    </>
  );
}
