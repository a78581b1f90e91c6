import type { LaserClass } from '../../../shared/schemas/benches';

/** Classes whose beam is not held to be able to hurt an eye at once; all others, and one not stated, get the caution. */
const classesWithoutCaution: ReadonlySet<LaserClass> = new Set<LaserClass>(['1', '1M', '2', '2M']);

/** A class that the lab has not stated is treated as one that can hurt. */
export function needsCaution(laserClass: LaserClass): boolean {
  return !classesWithoutCaution.has(laserClass);
}

const gap = '\u202f';

/** "810 nm", "405 and 810 nm", "405, 780 and 810 nm". */
export function wavelengthList(wavelengthsNm: readonly number[]): string {
  const numbers = wavelengthsNm.map(String);
  const last = numbers.at(-1);
  if (last === undefined) return 'every wavelength that can reach an eye';
  const before = numbers.slice(0, -1);
  return `${before.length === 0 ? '' : `${before.join(', ')} and `}${last}${gap}nm`;
}

export interface CautionWords {
  readonly title: string;
  readonly rules: readonly string[];
  readonly defers: string;
  /** The whole of it on one line, for a page that keeps it in view. */
  readonly short: string;
}

/** The usual cautions for a bench's beam. They list what is usual; they never say that anything is safe. */
export function cautionWords(laserClass: LaserClass, hazardWavelengthsNm: readonly number[]): CautionWords {
  const wavelengths = wavelengthList(hazardWavelengthsNm);
  const title =
    laserClass === null
      ? 'Laser class not stated: take it as one that can hurt'
      : `Laser class ${laserClass}: this beam can hurt`;
  const name = laserClass === null ? 'Class not stated' : `Class ${laserClass}`;
  return {
    title,
    rules: [
      `Wear eyewear made for ${wavelengths}, at the optical density that your laser-safety officer names.`,
      'Keep the beam at table height and terminate it; know where every reflection goes.',
      'No watch, ring or reflective tool near the beam.',
      'Power down, or block the beam at its source, before you touch the optics.',
    ],
    defers:
      'This is the usual caution and no more. Your local laser-safety officer, IEC 60825-1 and the rules of your site come first.',
    short: `${name}: eyewear for ${wavelengths}, beam at table height and terminated, nothing reflective near it, power down before you touch the optics. Your laser-safety officer, IEC 60825-1 and the site’s rules come first.`,
  };
}

/** What stands where the class has no caution of its own: the class, and who decides. */
export function classWords(laserClass: LaserClass): string {
  return laserClass === null
    ? 'laser class not stated'
    : `laser class ${laserClass}; your laser-safety officer and IEC 60825-1 decide what it asks for`;
}
