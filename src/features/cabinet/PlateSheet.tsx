import { useQuery } from '@tanstack/react-query';
import { useNavigate, useSearchParams } from 'react-router-dom';
import type { CabinetPlate } from '../../../shared/schemas/cabinet';
import { TextLink } from '../../components/TextLink';
import { QueryState } from '../../lib/QueryState';
import { useLab } from '../labs';
import { CalibrationForm } from './CalibrationForm';
import { EditPlateForm } from './EditPlateForm';
import { PlateFiles } from './files/PlateFiles';
import { PlateFacts } from './PlateFacts';
import { PlateHistory } from './PlateHistory';
import { plateQuery } from './queries';
import { RetirePlate } from './RetirePlate';
import { SheetDialogs } from './SheetDialogs';

/** The open plate's sheet: the mount, what was measured of it, and what relies on it. `?do=` opens a form or asks a question. */
export function PlateSheet({ plate, now }: { readonly plate: CabinetPlate; readonly now: Date }) {
  const { lab, may } = useLab();
  const [search] = useSearchParams();
  const navigate = useNavigate();
  const detail = useQuery(plateQuery(lab.id, plate.id));
  const task = search.get('do');
  const base = `/labs/${lab.id}/cabinet`;
  const page = `${base}/${plate.id}`;
  const retired = plate.retiredAt !== null;
  const edits = may('cabinet.write');
  const measures = may('calibrations.record') && !retired;
  const leave = () => void navigate(page, { preventScrollReset: true });
  return (
    <article
      aria-label={plate.name}
      className="grid grid-cols-1 gap-x-10 gap-y-8 pt-5 md:grid-cols-2 md:grid-rows-[auto_1fr] xl:grid-rows-1 xl:grid-cols-[18.5rem_minmax(0,1fr)_28.5rem]"
    >
      <div className="md:max-xl:row-span-2">
        <PlateFacts
          plate={plate}
          detail={detail.data}
          base={base}
          dueDays={lab.calibrationDueDays}
          now={now}
        />
        {edits && <SheetActions plate={plate} page={page} />}
        {detail.data !== undefined && (
          <PlateFiles labId={lab.id} plate={plate} files={detail.data.files} edits={edits && !retired} />
        )}
      </div>
      {task === 'edit' && edits && !retired ? (
        <section aria-labelledby="edit-plate" className="xl:col-span-2">
          <h3 id="edit-plate" className="text-section mb-3">
            Edit {plate.name}
          </h3>
          <EditPlateForm labId={lab.id} plate={plate} onDone={leave} />
        </section>
      ) : task === 'calibrate' && measures && plate.seat !== null ? (
        <section aria-labelledby="record-calibration" className="xl:col-span-2">
          <h3 id="record-calibration" className="text-section mb-3">
            Record a calibration of {plate.name}
          </h3>
          <CalibrationForm labId={lab.id} plate={plate} onDone={leave} />
        </section>
      ) : detail.data === undefined ? (
        <QueryState query={detail} what={`the history of ${plate.name}`} />
      ) : (
        <PlateHistory {...{ plate, page, now, measures }} detail={detail.data} seats={edits && !retired} />
      )}
      <SheetDialogs {...{ plate, task, measures }} seats={edits && !retired} onClose={leave} />
    </article>
  );
}

/** What can be done with the plate itself. */
function SheetActions({ plate, page }: { readonly plate: CabinetPlate; readonly page: string }) {
  const retired = plate.retiredAt !== null;
  return (
    <p className="mt-4 flex flex-wrap gap-x-5 gap-y-3">
      {!retired && (
        <>
          <TextLink to={`${page}?do=edit`} preventScrollReset>
            Edit {plate.name}
          </TextLink>
          {plate.seat === null ? (
            <TextLink to={`${page}?do=seat`} preventScrollReset>
              Seat {plate.name}
            </TextLink>
          ) : (
            <>
              <TextLink to={`${page}?do=take-out`} preventScrollReset>
                Take it out of {plate.seat.mount.name}
              </TextLink>
              <TextLink to={`${page}?do=seat-anew`} preventScrollReset>
                Seat it anew in {plate.seat.mount.name}
              </TextLink>
            </>
          )}
        </>
      )}
      <RetirePlate plate={plate} />
    </p>
  );
}
