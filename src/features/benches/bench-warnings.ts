import type { Plate } from '../../../shared/schemas/cabinet';

const gap = '\u202f';

/** Calibrated within this is calibrated at the bench's wavelength: a lab writes 810 for 809.6. */
const sameWavelengthNm = 0.5;

export function calibratedElsewhere(
  { calibration }: { readonly calibration: Pick<Plate['calibration'], 'wavelengthNm'> },
  benchNm: number,
): boolean {
  return Math.abs(calibration.wavelengthNm - benchNm) > sameWavelengthNm;
}

/** What a person should know before these plates stand in this bench; the server refuses a plate that stands elsewhere. */
export function benchWarnings(
  plates: readonly Plate[],
  wavelengthNm: number,
  benchId: string | null,
): readonly string[] {
  return plates.flatMap((plate) => {
    const warnings: string[] = [];
    if (Number.isFinite(wavelengthNm) && calibratedElsewhere(plate, wavelengthNm)) {
      warnings.push(
        `${plate.name} is calibrated at ${plate.calibration.wavelengthNm}${gap}nm, not at ${wavelengthNm}${gap}nm. Its retardance there is another one: record a calibration at ${wavelengthNm}${gap}nm.`,
      );
    }
    const others = plate.benches.filter(({ id }) => id !== benchId).map(({ name }) => name);
    if (others.length > 0) {
      warnings.push(
        `${plate.name} stands in the beam of ${others.join(' and ')}. Choose another, or take it out there first.`,
      );
    }
    if (plate.retiredAt !== null) {
      warnings.push(`${plate.name} is retired. Return it in the cabinet, or choose another.`);
    }
    return warnings;
  });
}
