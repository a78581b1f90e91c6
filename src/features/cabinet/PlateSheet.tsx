import { useQuery } from '@tanstack/react-query';
import { useId } from 'react';
import { useNavigate, useSearchParams } from 'react-router-dom';
import type { Plate } from '../../../shared/schemas/cabinet';
import { TextLink } from '../../components/TextLink';
import { formatDate } from '../../lib/format';
import { QueryState } from '../../lib/QueryState';
import { useLab } from '../labs';
import { CalibrationForm } from './CalibrationForm';
import { CalibrationTable } from './CalibrationTable';
import { EditPlateForm } from './EditPlateForm';
import { PlateFacts } from './PlateFacts';
import { PlateHistoryPlot } from './PlateHistoryPlot';
import { plateQuery } from './queries';
import { ReliesOn } from './ReliesOn';
import { RetirePlate } from './RetirePlate';

function Calibrations({
  plate,
  now,
  measures,
}: {
  readonly plate: Plate;
  readonly now: Date;
  readonly measures: boolean;
}) {
  const { lab } = useLab();
  const detail = useQuery(plateQuery(lab.id, plate.id));
  const tableId = useId();
  const calibrations = detail.data?.calibrations;
  if (calibrations === undefined)
    return <QueryState query={detail} what={`the calibrations of ${plate.name}`} />;
  const oldest = calibrations.at(-1);
  return (
    <>
      <section aria-labelledby={`${tableId}-head`}>
        <div className="mb-2 flex flex-wrap items-baseline justify-between gap-x-5">
          <h3 id={`${tableId}-head`} className="text-section">
            Calibrations of this seat
          </h3>
          {measures && (
            <TextLink to={`/labs/${lab.id}/cabinet/${plate.id}?do=calibrate`}>Record a calibration</TextLink>
          )}
        </div>
        <CalibrationTable id={tableId} calibrations={calibrations} now={now} />
      </section>
      <section aria-labelledby={`${tableId}-plot`}>
        <h3 id={`${tableId}-plot`} className="text-section mb-2">
          {oldest === undefined ? 'Over time' : `Since ${formatDate(new Date(oldest.measuredAt))}`}
        </h3>
        {calibrations.length < 2 ? (
          <p className="text-ink-2">
            One calibration so far. With a second one this shows how {plate.name} drifts.
          </p>
        ) : (
          <PlateHistoryPlot plateName={plate.name} calibrations={calibrations} tableId={tableId} />
        )}
        <ReliesOn plate={plate} />
      </section>
    </>
  );
}

/** The open plate's sheet: the mount, what was measured of it, and what relies on it. `?do=` opens a form in its place. */
export function PlateSheet({ plate, now }: { readonly plate: Plate; readonly now: Date }) {
  const { lab, may } = useLab();
  const [search] = useSearchParams();
  const navigate = useNavigate();
  const task = search.get('do');
  const retired = plate.retiredAt !== null;
  const edits = may('cabinet.write');
  const measures = may('calibrations.record') && !retired;
  const leave = () => void navigate(`/labs/${lab.id}/cabinet/${plate.id}`, { preventScrollReset: true });
  return (
    <article
      aria-label={plate.name}
      className="grid grid-cols-1 gap-x-10 gap-y-8 pt-5 md:grid-cols-2 xl:grid-cols-[19rem_1fr_28.5rem]"
    >
      <div>
        <PlateFacts plate={plate} dueDays={lab.calibrationDueDays} now={now} />
        {edits && (
          <p className="mt-4 flex flex-wrap gap-5">
            {!retired && (
              <TextLink to={`/labs/${lab.id}/cabinet/${plate.id}?do=edit`}>Edit {plate.name}</TextLink>
            )}
            <RetirePlate plate={plate} />
          </p>
        )}
      </div>
      {task === 'edit' && edits && !retired ? (
        <section aria-labelledby="edit-plate" className="xl:col-span-2">
          <h3 id="edit-plate" className="text-section mb-3">
            Edit {plate.name}
          </h3>
          <EditPlateForm labId={lab.id} plate={plate} onDone={leave} />
        </section>
      ) : task === 'calibrate' && measures ? (
        <section aria-labelledby="record-calibration" className="xl:col-span-2">
          <h3 id="record-calibration" className="text-section mb-3">
            Record a calibration of {plate.name}
          </h3>
          <CalibrationForm labId={lab.id} plate={plate} now={now} onDone={leave} />
        </section>
      ) : (
        <Calibrations plate={plate} now={now} measures={measures} />
      )}
    </article>
  );
}
