import type { CabinetMount } from '../../../../shared/schemas/mounts';
import { useLab } from '../../labs';
import { RetireDialog } from '../RetireDialog';
import { retireMount, returnMount } from './queries';

/** Takes a mount out of use, or back in. */
export function RetireMount({ mount }: { readonly mount: CabinetMount }) {
  const { lab } = useLab();
  const retired = mount.retiredAt !== null;
  return (
    <RetireDialog
      labId={lab.id}
      name={mount.name}
      retired={retired}
      waitsFor={!retired && mount.plate !== null ? `${mount.plate.name} to be taken out` : undefined}
      change={() => (retired ? returnMount : retireMount)(lab.id, mount.id, mount.revision)}
    >
      {retired ? (
        <p>A plate can be seated in it again.</p>
      ) : (
        <p>
          No plate can be seated in it then.{' '}
          {mount.plate !== null && `${mount.plate.name} sits in it: take it out first. `}
          Its history stays. It can be returned.
        </p>
      )}
    </RetireDialog>
  );
}
