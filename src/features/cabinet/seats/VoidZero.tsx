import type { CabinetPlate } from '../../../../shared/schemas/cabinet';
import { ButtonLink } from '../../../components/Button';
import { NewSeatSign } from '../../../components/SmallSigns';
import { formatMoment } from '../../../lib/format';
import { waitingBenches } from '../plate-words';

/** A plate without a zero: what that means, and the two ways on. */
export function VoidZero(props: {
  readonly plate: CabinetPlate;
  /** The address of its page. */
  readonly page: string;
  /** It sat somewhere before, so that an older zero is known and void. */
  readonly hadZero: boolean;
  readonly now: Date;
  readonly measures: boolean;
  readonly seats: boolean;
}) {
  const { plate, page, hadZero, now, measures, seats } = props;
  const { name, seat } = plate;
  const wait = waitingBenches(plate.benches);
  const since = seat === null ? '' : formatMoment(new Date(seat.seatedAt), now);
  return (
    <section aria-labelledby={`void-${plate.id}`} className="flex gap-5">
      <NewSeatSign className="mt-1 scale-150" />
      <div className="min-w-0 flex-1">
        <h3 id={`void-${plate.id}`} className="text-section">
          {seat === null
            ? `${name} sits nowhere, so it has no zero`
            : hadZero
              ? `${name}’s zero is void since the new seat`
              : `${name} has no zero yet`}
        </h3>
        <p className="mt-1">
          {seat === null ? 'No mount holds it. ' : `${name} sits in ${seat.mount.name} since ${since}. `}
          {hadZero
            ? 'The zero of its last seat ended with that seat, and no dial that was solved with it holds.'
            : 'Nothing was measured of it there, so no angle of it is known.'}
          {wait !== null && ` ${wait} for it.`}
        </p>
        {(seat === null ? seats : measures) && (
          <p className="mt-4 flex flex-wrap gap-4">
            {seat === null ? (
              <ButtonLink kind="filled" to={`${page}?do=seat`} preventScrollReset>
                Seat {name}
              </ButtonLink>
            ) : (
              <>
                <ButtonLink kind="filled" to={`${page}/scan`}>
                  Scan between polarisers
                </ButtonLink>
                <ButtonLink to={`${page}?do=calibrate`} preventScrollReset>
                  Record values by hand
                </ButtonLink>
              </>
            )}
          </p>
        )}
      </div>
    </section>
  );
}
