import { fastAxisFromDial } from '../../../shared/optics/dial';
import { degrees } from '../../../shared/optics/units';
import type { Plate } from '../../../shared/schemas/cabinet';

/** Between a number and its unit in plain text. */
const gap = '\u202f';

export const kindNames = { half: 'half-wave plate', quarter: 'quarter-wave plate', other: 'plate' } as const;

/** Under a ring of the tray: "½ wave, 780 nm", or the retardance where the plate is neither. */
export function shortKind(plate: Plate): string {
  const { wavelengthNm, retardanceDeg } = plate.calibration;
  const kind = { half: '½ wave', quarter: '¼ wave', other: `${retardanceDeg.toFixed(1)}°` }[plate.kind];
  return `${kind}, ${wavelengthNm}${gap}nm`;
}

/** Which way the mount's engraving runs. */
export function directionWords(direction: 1 | -1): string {
  return `numbers rise when it is turned ${direction === 1 ? 'counter-clockwise' : 'clockwise'}`;
}

/** The table angle of the fast axis with the dial at 0: how a plate is drawn where nobody says what its dial reads. */
export function restingAxisDeg({ mount, calibration }: Plate): number {
  return fastAxisFromDial(degrees(0), { ...mount, offsetDeg: calibration.offsetDeg });
}
