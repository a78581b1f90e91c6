import type { ReactNode } from 'react';
import type { Plate } from '../../../shared/schemas/cabinet';
import { Quantity } from '../../components/NumberText';
import { RingDial } from '../../components/RingDial';
import { formatDate, formatDial, formatUncertain, withTrueMinus } from '../../lib/format';
import { type CalibrationAge, calibrationAge } from './calibration-age';
import { builtWords, directionWords, kindNames, motionWords } from './plate-words';

function Fact({ name, children }: { readonly name: string; readonly children: ReactNode }) {
  return (
    <div className="border-hair grid grid-cols-[6rem_1fr] gap-3 border-b py-2">
      <dt className="text-ink-2">{name}</dt>
      <dd>{children}</dd>
    </div>
  );
}

function DueWords({ age }: { readonly age: CalibrationAge }) {
  const date = formatDate(age.dueAt);
  return age.overdue ? (
    <>
      {date}, <span className="text-fault font-strong">{age.words}</span>
    </>
  ) : (
    <>{date}</>
  );
}

/** A plate as its mount reads with the fast axis along H, and what is known of both. */
export function PlateFacts(props: { readonly plate: Plate; readonly dueDays: number; readonly now: Date }) {
  const { plate, dueDays, now } = props;
  const { mount, calibration } = plate;
  const zero = formatUncertain(calibration.offsetDeg, calibration.offsetSigmaDeg);
  const repeats =
    mount.repeatabilityDeg === 0 ? 'repeatability not stated' : `repeats within ${mount.repeatabilityDeg}°`;
  return (
    <div>
      <div className="flex flex-wrap items-baseline gap-x-4">
        <h2 className="text-title">{plate.name}</h2>
        <p className="text-ink-2">
          {kindNames[plate.kind]} in mount {mount.name}
        </p>
      </div>
      <figure className="flex flex-col items-center">
        <RingDial
          radius={95}
          kind={plate.kind}
          scale={{ offsetDeg: calibration.offsetDeg, direction: mount.direction }}
          readingDeg={calibration.offsetDeg}
          className="max-w-full"
        />
        <figcaption className="text-ink-2 text-center">
          reads <b className="text-ink font-mono">{formatDial(calibration.offsetDeg, 0.01)}</b> when its fast
          axis lies along H; {directionWords(mount.direction)}
        </figcaption>
      </figure>
      <dl className="mt-4">
        <Fact name="zero">
          <span className="font-strong font-mono">{zero}°</span>
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
        </Fact>
        <Fact name="plate">
          made for <Quantity text={String(plate.designWavelengthNm)} unit="nm" />
          {builtWords(plate)}
        </Fact>
        <Fact name="dial">
          to {mount.resolutionDeg}°, {repeats}
          {motionWords(mount)}
        </Fact>
        <Fact name="seat">since {formatDate(new Date(plate.seatedAt))}</Fact>
        <Fact name="due">
          <DueWords age={calibrationAge(calibration.measuredAt, dueDays, now)} />
        </Fact>
        {plate.note !== '' && <Fact name="note">{plate.note}</Fact>}
        {plate.retiredAt !== null && <Fact name="retired">{formatDate(new Date(plate.retiredAt))}</Fact>}
      </dl>
    </div>
  );
}
