import type { CabinetPlate, PlateDetail } from '../../../shared/schemas/cabinet';
import type { Calibration } from '../../../shared/schemas/calibrations';
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
  /** Its history; absent until it has come. */
  readonly detail: PlateDetail | undefined;
  /** The address of the cabinet. */
  readonly base: string;
  readonly dueDays: number;
  readonly now: Date;
}

/** A plate as its mount reads with the fast axis along H, and what is known of both. */
export function PlateFacts(props: FactsProps) {
  const { plate, detail, base } = props;
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
        {plate.calibration === null ? (
          <Unmeasured plate={plate} calibrations={detail?.calibrations} />
        ) : (
          <Measured plate={plate} calibration={plate.calibration} />
        )}
        <Made plate={plate} />
        <Seated {...props} />
        {plate.damageNote !== '' && <Fact name="damage">{plate.damageNote}</Fact>}
        {plate.note !== '' && <Fact name="note">{plate.note}</Fact>}
        {plate.retiredAt !== null && <Fact name="retired">{formatDate(new Date(plate.retiredAt))}</Fact>}
      </dl>
    </div>
  );
}

/** What is left of a plate's measurements in a seat without any: a retardance goes with the plate, a zero with its seat. */
function Unmeasured(props: {
  readonly plate: CabinetPlate;
  readonly calibrations: PlateDetail['calibrations'] | undefined;
}) {
  const { plate, calibrations } = props;
  const last = calibrations?.[0];
  const unknown = calibrations === undefined ? 'not known' : 'not measured yet';
  const none = last === undefined ? unknown : 'void until it is calibrated';
  return (
    <>
      <Fact name="zero">{plate.seat === null ? 'none: it sits nowhere' : none}</Fact>
      {last !== undefined && (
        <Fact name="retardance">
          <Retardance of={last} />
          <span className="text-s text-ink-2 block">measured in an earlier seat</span>
        </Fact>
      )}
    </>
  );
}

function Retardance({ of }: { readonly of: Calibration }) {
  return (
    <>
      <span className="font-strong font-mono">
        {formatUncertain(of.retardanceDeg, of.retardanceSigmaDeg)}°
      </span>{' '}
      at <Quantity text={String(of.wavelengthNm)} unit="nm" />
      {of.temperatureC !== null && (
        <>
          {' '}
          and <Quantity text={withTrueMinus(String(of.temperatureC))} unit="°C" />
        </>
      )}
    </>
  );
}

function Measured(props: { readonly plate: CabinetPlate; readonly calibration: Calibration }) {
  const { plate, calibration } = props;
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
        <Retardance of={calibration} />
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

function Seated({ plate, detail, dueDays, now }: FactsProps) {
  const seats = detail?.seats;
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
