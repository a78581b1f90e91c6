import { useId } from 'react';
import type { CabinetPlate, PlateDetail } from '../../../shared/schemas/cabinet';
import { TextLink } from '../../components/TextLink';
import { formatDate } from '../../lib/format';
import { useLab } from '../labs';
import { ReliesOnPlate } from '../reliance';
import { ScanFigure } from '../scan';
import { HistoryTable } from './history/HistoryTable';
import { PlateHistoryPlot } from './history/PlateHistoryPlot';
import { OpenQuestions } from './questions/OpenQuestions';
import { scanOf } from './scan-of';
import { VoidZero } from './seats/VoidZero';

/** What was measured of a plate, what that leaves open, and what relies on it. */
export function PlateHistory(props: {
  readonly plate: CabinetPlate;
  readonly detail: PlateDetail;
  /** The address of its page. */
  readonly page: string;
  readonly now: Date;
  readonly measures: boolean;
  readonly seats: boolean;
}) {
  const { plate, detail, page, now, measures, seats } = props;
  const { lab } = useLab();
  const tableId = useId();
  const { calibration, seat } = plate;
  const oldest = detail.calibrations.at(-1);
  const asks = calibration === null || calibration.openQuestions.length > 0;
  const scanned = calibration === null ? undefined : scanOf(calibration.id, detail.calibrations);
  const inSeat = detail.calibrations.filter(({ seatId }) => seatId === seat?.id);
  return (
    <>
      <div className="space-y-6">
        {scanned !== undefined && <ScanFigure plateId={plate.id} calibration={scanned} now={now} />}
        {calibration === null ? (
          <VoidZero {...{ plate, page, now, measures, seats }} hadZero={detail.calibrations.length > 0} />
        ) : (
          <OpenQuestions
            {...{ plate, calibration, page, measures }}
            sinceSeat={detail.seats.length > 1 && inSeat.length === 1}
          />
        )}
        <section
          aria-labelledby={`${tableId}-head`}
          className={asks ? 'border-ink border-t-[1.5px] pt-3' : undefined}
        >
          <div className="mb-2 flex flex-wrap items-baseline justify-between gap-x-5 gap-y-2">
            <h3 id={`${tableId}-head`} className="text-section">
              Seats and calibrations
            </h3>
            {measures && calibration !== null && (
              <span className="flex flex-wrap gap-x-5 gap-y-2">
                <TextLink to={`${page}/scan`}>Scan between polarisers</TextLink>
                <TextLink to={`${page}?do=calibrate`} preventScrollReset>
                  Record by hand
                </TextLink>
              </span>
            )}
          </div>
          {detail.seats.length === 0 ? (
            <p className="text-ink-2">It has sat in no mount yet.</p>
          ) : (
            <HistoryTable id={tableId} labId={lab.id} page={page} detail={detail} now={now} />
          )}
        </section>
      </div>
      <div>
        <section aria-labelledby={`${tableId}-plot`}>
          <h3 id={`${tableId}-plot`} className="text-section mb-2">
            {oldest === undefined ? 'Over time' : `Since ${formatDate(new Date(oldest.measuredAt))}`}
          </h3>
          {oldest === undefined ? (
            <p className="text-ink-2">With its first calibration this shows how {plate.name} drifts.</p>
          ) : (
            <PlateHistoryPlot plate={plate} detail={detail} tableId={tableId} />
          )}
        </section>
        <ReliesOnPlate plate={plate} />
      </div>
    </>
  );
}
