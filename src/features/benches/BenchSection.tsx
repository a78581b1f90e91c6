import type { Bench } from '../../../shared/schemas/benches';
import { AgeRing } from '../../components/AgeRing';
import { Quantity } from '../../components/NumberText';
import { TextLink } from '../../components/TextLink';
import { formatUncertain } from '../../lib/format';
import { calibrationAge, restingAxisDeg } from '../cabinet';
import { useLab } from '../labs';
import { GapText } from '../../lib/GapText';
import { benchWarnings } from './bench-warnings';
import { InputReading } from './InputReading';
import { LaserCaution } from './LaserCaution';
import { RetireBench } from './RetireBench';

/** The plates as the light meets them, each with its age. */
function PlatesInOrder({ bench, now }: { readonly bench: Bench; readonly now: Date }) {
  const { lab } = useLab();
  return (
    <ol aria-label="Plates in beam order" className="flex flex-wrap gap-8">
      {bench.plates.map((plate) => {
        const age = calibrationAge(plate.calibration.measuredAt, lab.calibrationDueDays, now);
        return (
          <li key={plate.id} className="flex items-center gap-3">
            <AgeRing
              radius={26}
              fastAxisDeg={restingAxisDeg(plate)}
              ageDays={age.ageDays}
              dueDays={lab.calibrationDueDays}
            />
            <div>
              <TextLink to={`/labs/${lab.id}/cabinet/${plate.id}`} className="font-strong">
                {plate.name}
              </TextLink>
              <p className="text-s text-ink-2 mt-1">
                {formatUncertain(plate.calibration.retardanceDeg, plate.calibration.retardanceSigmaDeg)}° at{' '}
                <Quantity text={String(plate.calibration.wavelengthNm)} unit="nm" />
              </p>
              <p className={age.overdue ? 'text-s text-fault font-strong' : 'text-s text-ink-2'}>
                calibration {age.words}
              </p>
            </div>
          </li>
        );
      })}
    </ol>
  );
}

/** One optical set-up. */
export function BenchSection({ bench, now = new Date() }: { readonly bench: Bench; readonly now?: Date }) {
  const { lab, may } = useLab();
  const headId = `bench-${bench.id}`;
  return (
    <section aria-labelledby={headId} className="border-ink space-y-4 border-t-[1.5px] pt-4">
      <div className="flex flex-wrap items-baseline gap-x-4">
        <h2 id={headId} className="text-section">
          {bench.name}
        </h2>
        <p className="text-ink-2">
          <Quantity text={String(bench.wavelengthNm)} unit="nm" />,{' '}
          <InputReading expression={bench.inputExpression} convention={lab.convention} /> behind the polariser
        </p>
        {may('benches.write') && (
          <span className="ml-auto flex gap-5">
            <TextLink to={`/labs/${lab.id}/bench/${bench.id}/edit`}>
              Edit<span className="sr-only"> {bench.name}</span>
            </TextLink>
            <RetireBench bench={bench} />
          </span>
        )}
      </div>
      <PlatesInOrder bench={bench} now={now} />
      {benchWarnings(bench.plates, bench, bench.id).map((warning) => (
        <p key={warning}>
          <GapText text={warning} />
        </p>
      ))}
      <LaserCaution
        laserClass={bench.laserClass}
        hazardWavelengthsNm={bench.hazardWavelengthsNm}
        variant="full"
      />
    </section>
  );
}
