import type { CabinetMount } from '../../../../shared/schemas/mounts';
import { formatDate } from '../../../lib/format';
import { Fact } from '../Fact';
import { directionWords, driveNames, motionSummary } from './mount-words';

/** What a mount can do. */
export function MountFacts({ mount }: { readonly mount: CabinetMount }) {
  return (
    <dl>
      <Fact name="drive">{driveNames[mount.drive]}</Fact>
      <Fact name="step">
        {mount.drive === 'hand' ? 'engraved' : 'set'} to {mount.resolutionDeg}°
      </Fact>
      <Fact name="repeats">
        {mount.repeatabilityDeg === 0 ? 'not stated' : `within ${mount.repeatabilityDeg}° (σ)`}
      </Fact>
      <Fact name="direction">{directionWords(mount.direction)}</Fact>
      <Fact name="motion">{motionSummary(mount)}</Fact>
      {mount.note !== '' && <Fact name="note">{mount.note}</Fact>}
      {mount.retiredAt !== null && <Fact name="retired">{formatDate(new Date(mount.retiredAt))}</Fact>}
    </dl>
  );
}
