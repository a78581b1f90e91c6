import type { Calibration } from '../../../shared/schemas/cabinet';
import { DataCell, DataRow, DataTable, HeadCell, RowHead } from '../../components/DataTable';
import { formatMoment, formatUncertain, withTrueMinus } from '../../lib/format';
import { Quantity } from '../../components/NumberText';
import { OnPoint, widestFraction } from './OnPoint';

const retardance = (calibration: Calibration) =>
  formatUncertain(calibration.retardanceDeg, calibration.retardanceSigmaDeg);
const zero = (calibration: Calibration) => formatUncertain(calibration.offsetDeg, calibration.offsetSigmaDeg);

/** Calibrations of one plate, newest first. A wrong one is corrected by a later one, so nothing here can be changed. */
export function CalibrationTable(props: {
  readonly id: string;
  readonly calibrations: readonly Calibration[];
  readonly now: Date;
}) {
  const { id, calibrations, now } = props;
  return (
    <div id={id}>
      <DataTable caption="Calibrations, newest first; the figures in brackets are σ">
        <thead>
          <tr>
            <HeadCell>measured</HeadCell>
            <HeadCell numeric>retardance(σ), degrees</HeadCell>
            <HeadCell numeric>zero(σ), degrees</HeadCell>
            <HeadCell numeric className="whitespace-nowrap">
              at, nm
            </HeadCell>
          </tr>
        </thead>
        <tbody>
          {calibrations.map((calibration) => (
            <DataRow key={calibration.id}>
              <RowHead className="py-2">
                {formatMoment(new Date(calibration.measuredAt), now)}
                <span className="text-s text-ink-2 font-words block">
                  {calibration.method}; {calibration.recordedBy}
                  {calibration.note !== '' && `. ${calibration.note}`}
                </span>
              </RowHead>
              <DataCell numeric className="align-top! py-2">
                <OnPoint
                  text={retardance(calibration)}
                  widest={widestFraction(calibrations.map(retardance))}
                />
              </DataCell>
              <DataCell numeric className="align-top! py-2">
                <OnPoint text={zero(calibration)} widest={widestFraction(calibrations.map(zero))} />
              </DataCell>
              <DataCell numeric className="align-top! py-2">
                {calibration.wavelengthNm}
                {calibration.temperatureC !== null && (
                  <span className="text-s text-ink-2 block">
                    <Quantity text={withTrueMinus(String(calibration.temperatureC))} unit="°C" />
                  </span>
                )}
              </DataCell>
            </DataRow>
          ))}
        </tbody>
      </DataTable>
    </div>
  );
}
