import type { CabinetMount, Mount } from '../../../../shared/schemas/mounts';
import { withTrueMinus } from '../../../lib/format';

export const driveNames = { hand: 'turned by hand', motor: 'motor' } as const;

export const approachNames: Readonly<Record<string, string>> = {
  either: 'from either side',
  rising: 'with rising numbers',
  falling: 'with falling numbers',
};

/** Which way the mount's engraving runs. */
export function directionWords(direction: 1 | -1): string {
  return `numbers rise when it is turned ${direction === 1 ? 'counter-clockwise' : 'clockwise'}`;
}

/** "to 0.1°, repeats within 0.06°": how well its dial is read and comes back. */
export function dialWords({ resolutionDeg, repeatabilityDeg }: Mount): string {
  const repeats = repeatabilityDeg === 0 ? 'repeatability not stated' : `repeats within ${repeatabilityDeg}°`;
  return `to ${resolutionDeg}°, ${repeats}`;
}

/** "20°/s", "reaches 0° to 350°": what is out of the ordinary of a mount's motion. */
function motionParts({ speedDegPerS, rangeDeg, backlashDeg, approach }: Mount): string[] {
  const parts = [
    speedDegPerS === null ? null : `${speedDegPerS}°/s`,
    rangeDeg === null ? null : withTrueMinus(`reaches ${rangeDeg.from}° to ${rangeDeg.to}°`),
    backlashDeg === 0 ? null : `backlash ${backlashDeg}°`,
    approach === 'either' ? null : `approached ${approachNames[approach] ?? ''}`,
  ];
  return parts.filter((part) => part !== null);
}

/** The same as the end of a sentence: each part after its comma. */
export function motionWords(mount: Mount): string {
  return motionParts(mount)
    .map((part) => `, ${part}`)
    .join('');
}

/** The same by itself; "turns all the way round" where there is nothing to say. */
export function motionSummary(mount: Mount): string {
  const parts = motionParts(mount);
  return parts.length === 0 ? 'turns all the way round' : parts.join(', ');
}

/** What a mount is doing: holds a plate, is empty, or is retired. */
export function mountState({ plate, retiredAt }: CabinetMount): 'holding' | 'empty' | 'retired' {
  if (retiredAt !== null) return 'retired';
  return plate === null ? 'empty' : 'holding';
}
