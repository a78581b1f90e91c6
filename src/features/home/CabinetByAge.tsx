import { Link } from 'react-router-dom';
import type { CabinetPlate } from '../../../shared/schemas/cabinet';
import { AgeRing } from '../../components/AgeRing';
import { SectionHead } from '../../components/SectionHead';
import { TextLink } from '../../components/TextLink';
import { calibrationAge, restingAxisDeg } from '../cabinet';
import { useLab } from '../labs';

/** A plate without a zero is nothing to worry about while no bench has it in its beam. */
function isWrong({ benches }: CabinetPlate, age: ReturnType<typeof calibrationAge> | null): boolean {
  return age === null ? benches.length > 0 : age.overdue;
}

/** The plates at hand, with how old each one's calibration is. */
export function CabinetByAge({
  plates,
  now,
}: {
  readonly plates: readonly CabinetPlate[];
  readonly now: Date;
}) {
  const { lab } = useLab();
  return (
    <section aria-labelledby="cabinet-by-age" className="mt-8">
      <SectionHead
        id="cabinet-by-age"
        size="large"
        note="the outer arc is the time since calibration; a full quarter turn means due"
        action={<TextLink to={`/labs/${lab.id}/cabinet`}>All plates and mounts</TextLink>}
      >
        Cabinet
      </SectionHead>
      <ul className="mt-4 flex flex-wrap gap-y-5">
        {plates.map((plate) => {
          const age =
            plate.calibration === null
              ? null
              : calibrationAge(plate.calibration.measuredAt, lab.calibrationDueDays, now);
          return (
            <li key={plate.id} className="min-w-24 max-w-40 flex-1">
              <Link
                to={`/labs/${lab.id}/cabinet/${plate.id}`}
                className="hover:bg-wash flex flex-col items-center py-1 text-center"
              >
                <AgeRing
                  radius={33}
                  fastAxisDeg={restingAxisDeg(plate)}
                  ageDays={age?.ageDays ?? null}
                  unsettled={plate.health === 'open-question'}
                  dueDays={lab.calibrationDueDays}
                />
                <span className="font-strong mt-1">{plate.name}</span>
                <span className={isWrong(plate, age) ? 'text-s text-fault font-strong' : 'text-s text-ink-2'}>
                  {age?.words ?? (plate.seat === null ? 'in no mount' : 'not calibrated')}
                </span>
              </Link>
            </li>
          );
        })}
      </ul>
    </section>
  );
}
