import type { PlateDetail, SeatedCalibration } from '../../../../shared/schemas/cabinet';
import type { Seat } from '../../../../shared/schemas/mounts';
import { DataCell, DataRow, DataTable, HeadCell, RowHead } from '../../../components/DataTable';
import { Quantity } from '../../../components/NumberText';
import { TextLink } from '../../../components/TextLink';
import { formatDate, formatMoment, formatUncertain, withTrueMinus } from '../../../lib/format';
import { fileAddress } from '../../../lib/upload';
import { sizeWords } from '../files/size-words';
import { ordinal, questionWords } from '../plate-words';
import { OnPoint, widestFraction } from './OnPoint';
import { type SeatHistory, seatHistories } from './seat-history';

const retardance = (calibration: SeatedCalibration) =>
  formatUncertain(calibration.retardanceDeg, calibration.retardanceSigmaDeg);
const zero = (calibration: SeatedCalibration) =>
  formatUncertain(calibration.offsetDeg, calibration.offsetSigmaDeg);

/** Every seat of one plate and what was measured in it, newest first. What was recorded is corrected by a later one and never changed. */
export function HistoryTable(props: {
  readonly id: string;
  readonly labId: string;
  /** The address of the plate's page. */
  readonly page: string;
  readonly detail: Pick<PlateDetail, 'seats' | 'calibrations'>;
  readonly now: Date;
}) {
  const { id, labId, page, detail, now } = props;
  const widest = {
    retardance: widestFraction(detail.calibrations.map(retardance)),
    zero: widestFraction(detail.calibrations.map(zero)),
  };
  return (
    <div id={id}>
      <DataTable caption="Seats and calibrations, newest first; the figures in brackets are σ">
        <thead>
          <tr>
            <HeadCell>measured</HeadCell>
            <HeadCell numeric className="sm:whitespace-nowrap">
              retardance(σ), °
            </HeadCell>
            <HeadCell numeric className="sm:whitespace-nowrap">
              zero(σ), °
            </HeadCell>
            <HeadCell numeric className="hidden whitespace-nowrap sm:table-cell">
              at, nm
            </HeadCell>
          </tr>
        </thead>
        {seatHistories(detail).map((history) => (
          <tbody key={history.seat.id}>
            <SeatRow history={history} now={now} />
            {history.calibrations.map((calibration) => (
              <CalibrationRow
                key={calibration.id}
                {...{ labId, page, calibration, widest, now }}
                settled={detail.calibrations.find(({ id: other }) => other === calibration.settlesId)}
                ended={history.seat.leftAt !== null}
              />
            ))}
          </tbody>
        ))}
      </DataTable>
    </div>
  );
}

function seatTime({ seatedAt, leftAt }: Seat, now: Date): string {
  const from = new Date(seatedAt);
  if (leftAt === null) return `since ${formatMoment(from, now)}`;
  return `${formatDate(from)} to ${formatDate(new Date(leftAt))}`;
}

function SeatRow({ history, now }: { readonly history: SeatHistory; readonly now: Date }) {
  const { seat, position, calibrations } = history;
  const head = `${ordinal(position)} seat`;
  return (
    <tr className="border-ink border-b">
      <th scope="rowgroup" colSpan={4} className="pt-4 pb-1.5 text-left font-words">
        <span className="font-strong">{head.charAt(0).toUpperCase() + head.slice(1)}</span>, in{' '}
        {seat.mount.name}, {seatTime(seat, now)}
        <span className="text-s text-ink-2 block">
          seated by {seat.seatedBy}
          {seat.leftAt !== null && `; its zeros are void. ${seat.leftWhy ?? ''}`}
          {calibrations.length === 0 && '; not calibrated in it'}
        </span>
      </th>
    </tr>
  );
}

function CalibrationRow(props: {
  readonly labId: string;
  readonly page: string;
  readonly calibration: SeatedCalibration;
  readonly settled: SeatedCalibration | undefined;
  readonly ended: boolean;
  readonly widest: { readonly retardance: number; readonly zero: number };
  readonly now: Date;
}) {
  const { labId, page, calibration, settled, ended, widest, now } = props;
  const cell = `align-top! py-2 ${ended ? 'text-ink-3' : ''}`;
  return (
    <DataRow>
      <RowHead className="min-w-28 py-2 sm:min-w-44">
        {formatMoment(new Date(calibration.measuredAt), now)}
        <span className="text-s text-ink-2 font-words block sm:hidden">
          <Quantity text={String(calibration.wavelengthNm)} unit="nm" />
          {calibration.temperatureC !== null && (
            <>
              , <Quantity text={withTrueMinus(String(calibration.temperatureC))} unit="°C" />
            </>
          )}
        </span>
        <span className="text-s text-ink-2 font-words block">
          {calibration.method}; {calibration.recordedBy}
          {calibration.note !== '' && `. ${calibration.note}`}
        </span>
        {settled !== undefined && (
          <span className="text-s text-ink-2 font-words block">
            settles what that of {formatMoment(new Date(settled.measuredAt), now)} left open
          </span>
        )}
        {calibration.openQuestions.map((question) => (
          <span key={question} className="text-s text-ink block font-words">
            {questionWords[question]}
          </span>
        ))}
        {calibration.scan !== null && calibration.fileId !== null && (
          <span className="text-s text-ink-2 font-words block">
            <TextLink to={`${page}/scan?calibration=${calibration.id}`}>See the scan</TextLink>,{' '}
            <a className="beam-link" href={fileAddress(labId, calibration.fileId)} download>
              Download {calibration.scan.name}
            </a>
            , {sizeWords(calibration.scan.sizeBytes)}, SHA-256{' '}
            <span className="font-mono text-xs break-all">{calibration.scan.sha256}</span>
          </span>
        )}
      </RowHead>
      <DataCell numeric className={cell}>
        <OnPoint text={retardance(calibration)} widest={widest.retardance} />
      </DataCell>
      <DataCell numeric className={cell}>
        <OnPoint text={zero(calibration)} widest={widest.zero} />
      </DataCell>
      <DataCell numeric className={`hidden sm:table-cell ${cell}`}>
        {calibration.wavelengthNm}
        {calibration.temperatureC !== null && (
          <span className="text-s text-ink-2 block">
            <Quantity text={withTrueMinus(String(calibration.temperatureC))} unit="°C" />
          </span>
        )}
      </DataCell>
    </DataRow>
  );
}
