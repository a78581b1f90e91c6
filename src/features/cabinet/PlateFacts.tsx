import type { CabinetPlate, PlateDetail } from '../../../shared/schemas/cabinet';
import { Quantity } from '../../components/NumberText';
import { TextLink } from '../../components/TextLink';
import { formatDate, formatMoment, formatUncertain, withTrueMinus } from '../../lib/format';
import { calibrationAge } from './calibration-age';
import { Fact } from './Fact';
import { dialWords, motionWords } from './mounts/mount-words';
import { besideModel, besideModelWords, farInSigmas } from './plate-model';
import { builtWords, kindNames, ordinal } from './plate-words';
import { PlateRing } from './PlateRing';

interface FactsProps {
  readonly plate: CabinetPlate;
  /** Every seat it has had, newest first; absent until they have come. */
  readonly seats: PlateDetail['seats'] | undefined;
  /** The address of the cabinet. */
  readonly base: string;
  readonly dueDays: number;
  readonly now: Date;
}

/** A plate as its mount reads with the fast axis along H, and what is known of both. */
export function PlateFacts(props: FactsProps) {
  const { plate, base } = props;
  const { seat } = plate;
  return (
    <div>
      <div className="flex flex-wrap items-baseline gap-x-4">
        <h2 className="text-title">{plate.name}</h2>
        <p className="text-ink-2">
          {kindNames[plate.kind]}
          {seat !== null && (
            <>
              {' '}
              in mount <TextLink to={`${base}/mounts/${seat.mountId}`}>{seat.mount.name}</TextLink>
            </>
          )}
        </p>
      </div>
      <PlateRing plate={plate} />
      <dl className="mt-4">
        <Measured plate={plate} />
        <Made plate={plate} />
        <Seated {...props} />
        {plate.damageNote !== '' && <Fact name="damage">{plate.damageNote}</Fact>}
        {plate.note !== '' && <Fact name="note">{plate.note}</Fact>}
        {plate.retiredAt !== null && <Fact name="retired">{formatDate(new Date(plate.retiredAt))}</Fact>}
      </dl>
    </div>
  );
}

function Measured({ plate }: { readonly plate: CabinetPlate }) {
  const { calibration } = plate;
  if (calibration === null) {
    return (
      <Fact name="zero">{plate.seat === null ? 'none: it sits nowhere' : 'void until it is calibrated'}</Fact>
    );
  }
  const beside = besideModel(plate, calibration);
  const far = beside?.sigmas !== null && beside !== null && beside.sigmas >= farInSigmas;
  return (
    <>
      <Fact name="zero">
        <span className="font-strong font-mono">
          {formatUncertain(calibration.offsetDeg, calibration.offsetSigmaDeg)}°
        </span>
      </Fact>
      <Fact name="retardance">
        <span className="font-strong font-mono">
          {formatUncertain(calibration.retardanceDeg, calibration.retardanceSigmaDeg)}°
        </span>{' '}
        at <Quantity text={String(calibration.wavelengthNm)} unit="nm" />
        {calibration.temperatureC !== null && (
          <>
            {' '}
            and <Quantity text={withTrueMinus(String(calibration.temperatureC))} unit="°C" />
          </>
        )}
        {beside !== null && (
          <span className={`text-s block ${far ? 'text-ink' : 'text-ink-2'}`}>
            {besideModelWords(beside)}
          </span>
        )}
      </Fact>
    </>
  );
}

function Made({ plate }: { readonly plate: CabinetPlate }) {
  return (
    <>
      <Fact name="plate">
        made for <Quantity text={String(plate.designWavelengthNm)} unit="nm" />
        {builtWords(plate)}
      </Fact>
      {plate.serial !== '' && (
        <Fact name="serial">
          <span className="font-mono">{plate.serial}</span>
        </Fact>
      )}
      {plate.clearApertureMm !== null && (
        <Fact name="aperture">
          <Quantity text={String(plate.clearApertureMm)} unit="mm" /> clear
        </Fact>
      )}
      {plate.coatingNm !== null && (
        <Fact name="coating">
          for {plate.coatingNm.from} to <Quantity text={String(plate.coatingNm.to)} unit="nm" />
        </Fact>
      )}
    </>
  );
}

function Seated({ plate, seats, dueDays, now }: FactsProps) {
  const { seat, calibration } = plate;
  const age = calibration === null ? null : calibrationAge(calibration.measuredAt, dueDays, now);
  const last = seats?.[0];
  return (
    <>
      {seat !== null && (
        <Fact name="dial">
          {dialWords(seat.mount)}
          {motionWords(seat.mount)}
        </Fact>
      )}
      <Fact name="seat">
        {seat !== null
          ? `${seats === undefined ? '' : `${ordinal(seats.length)}, `}since ${formatMoment(new Date(seat.seatedAt), now)}`
          : last?.leftAt === null || last === undefined
            ? 'none yet'
            : `none since ${formatMoment(new Date(last.leftAt), now)}`}
      </Fact>
      {age !== null && (
        <Fact name="due">
          {formatDate(age.dueAt)}
          {age.overdue && (
            <>
              , <span className="text-fault font-strong">{age.words}</span>
            </>
          )}
        </Fact>
      )}
    </>
  );
}
