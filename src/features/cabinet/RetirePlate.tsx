import type { CabinetPlate } from '../../../shared/schemas/cabinet';
import { useLab } from '../labs';
import { retirePlate, returnPlate } from './queries';
import { RetireDialog } from './RetireDialog';

/** Takes a plate out of use, or back in. */
export function RetirePlate({ plate }: { readonly plate: CabinetPlate }) {
  const { lab } = useLab();
  const retired = plate.retiredAt !== null;
  const benches = plate.benches.map(({ name }) => name).join(' and ');
  return (
    <RetireDialog
      labId={lab.id}
      name={plate.name}
      retired={retired}
      waitsFor={!retired && benches !== '' ? `another plate at ${benches}` : undefined}
      change={() => (retired ? returnPlate : retirePlate)(lab.id, plate.id, plate.revision)}
    >
      {retired ? (
        <p>
          It can be put into a bench again. If it was out of its mount since, seat it anew first: its zero is
          another one then.
        </p>
      ) : (
        <p>
          It leaves the tray and cannot be chosen for a bench.{' '}
          {benches === ''
            ? 'No bench has it in its beam now.'
            : `It stands in the beam of ${benches}: put another plate there first.`}{' '}
          Versions and runs that used it keep it. It can be returned.
        </p>
      )}
    </RetireDialog>
  );
}
