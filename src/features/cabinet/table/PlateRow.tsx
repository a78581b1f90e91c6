import type { CabinetPlate } from '../../../../shared/schemas/cabinet';
import { DataCell, DataRow, RowHead } from '../../../components/DataTable';
import { HealthSign } from '../../../components/HealthSign';
import { TextLink } from '../../../components/TextLink';
import { formatUncertain, missingSign } from '../../../lib/format';
import { calibrationAge } from '../calibration-age';
import { OnPoint, widestFraction } from '../history/OnPoint';
import { healthWords, kindNames } from '../plate-words';

const retardance = ({ calibration }: CabinetPlate) =>
  calibration === null
    ? missingSign
    : formatUncertain(calibration.retardanceDeg, calibration.retardanceSigmaDeg);
const zero = ({ calibration }: CabinetPlate) =>
  calibration === null ? missingSign : formatUncertain(calibration.offsetDeg, calibration.offsetSigmaDeg);

/** How far the numbers of a column reach behind their point. */
interface WidestNumbers {
  readonly retardance: number;
  readonly zero: number;
}

export function widestNumbers(plates: readonly CabinetPlate[]): WidestNumbers {
  return { retardance: widestFraction(plates.map(retardance)), zero: widestFraction(plates.map(zero)) };
}

export function PlateRow(props: {
  readonly plate: CabinetPlate;
  readonly base: string;
  readonly dueDays: number;
  readonly now: Date;
  readonly widest: WidestNumbers;
}) {
  const { plate, base, dueDays, now, widest } = props;
  const { calibration, health, seat, benches } = plate;
  const age = calibration === null ? null : calibrationAge(calibration.measuredAt, dueDays, now);
  return (
    <DataRow>
      <RowHead className="whitespace-nowrap">
        <TextLink to={`${base}/${plate.id}`}>{plate.name}</TextLink>
      </RowHead>
      <DataCell className="whitespace-nowrap">
        <span className="flex items-center gap-1.5">
          <HealthSign health={health} />
          <span className={health === 'overdue' ? 'text-fault font-strong' : ''}>{healthWords[health]}</span>
        </span>
      </DataCell>
      <DataCell className={age?.overdue === true ? 'text-fault font-strong' : ''}>
        {age?.words ?? missingSign}
      </DataCell>
      <DataCell>{kindNames[plate.kind]}</DataCell>
      <DataCell numeric>{plate.designWavelengthNm}</DataCell>
      <DataCell numeric>
        <OnPoint text={retardance(plate)} widest={widest.retardance} />
      </DataCell>
      <DataCell numeric>{calibration?.wavelengthNm ?? missingSign}</DataCell>
      <DataCell numeric>
        <OnPoint text={zero(plate)} widest={widest.zero} />
      </DataCell>
      <DataCell className="pl-6!">
        {seat === null ? (
          missingSign
        ) : (
          <TextLink to={`${base}/mounts/${seat.mountId}`}>{seat.mount.name}</TextLink>
        )}
      </DataCell>
      <DataCell>{benches.length === 0 ? missingSign : benches.map(({ name }) => name).join(', ')}</DataCell>
    </DataRow>
  );
}
