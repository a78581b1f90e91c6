import { fastAxisFromDial } from '../../../shared/optics/dial';
import { degrees } from '../../../shared/optics/units';
import type { CabinetPlate, Plate } from '../../../shared/schemas/cabinet';
import { withTrueMinus } from '../../lib/format';

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

/**
 * The table angle of the fast axis with the dial at 0: how a plate is drawn where nobody says what its dial reads. Null
 * while nobody knows it.
 */
export function restingAxisDeg({ seat, calibration }: CabinetPlate): number | null {
  if (seat === null || calibration === null) return null;
  return fastAxisFromDial(degrees(0), { ...seat.mount, offsetDeg: calibration.offsetDeg });
}

type Names = Readonly<Record<string, string>>;

export const constructionNames: Names = {
  'true-zero-order': 'true zero order',
  'compound-zero-order': 'compound zero order',
  'multi-order': 'multi-order',
  achromatic: 'achromatic',
  unknown: 'not known',
};

export const materialNames: Names = {
  quartz: 'quartz',
  'magnesium-fluoride': 'magnesium fluoride',
  calcite: 'calcite',
  sapphire: 'sapphire',
  '': 'another, or not known',
};

export const approachNames: Names = {
  either: 'from either side',
  rising: 'with rising numbers',
  falling: 'with falling numbers',
};

/** ", compound zero order, quartz": how it is built, as far as that is known; starts with its comma. */
export function builtWords({ construction, material, order }: Plate): string {
  const parts = [
    construction === 'unknown' ? null : constructionNames[construction],
    order === 0 ? null : `${order} whole waves`,
    material === null ? null : materialNames[material],
  ];
  return parts.flatMap((part) => (part === null || part === undefined ? [] : [`, ${part}`])).join('');
}

/** ", 20°/s, 0° to 350°, backlash 0.05°, with rising numbers": what is out of the ordinary of a mount's motion. */
export function motionWords({ speedDegPerS, rangeDeg, backlashDeg, approach }: Plate['mount']): string {
  const parts = [
    speedDegPerS === null ? null : `${speedDegPerS}°/s`,
    rangeDeg === null ? null : withTrueMinus(`reaches ${rangeDeg.from}° to ${rangeDeg.to}°`),
    backlashDeg === 0 ? null : `backlash ${backlashDeg}°`,
    approach === 'either' ? null : `approached ${approachNames[approach] ?? ''}`,
  ];
  return parts.flatMap((part) => (part === null ? [] : [`, ${part}`])).join('');
}
