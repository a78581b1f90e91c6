import { fieldAt, radians, type Stokes, stokesToJones, toDegrees } from '../../../shared/optics';

/** The field at z = 0 at one moment, in units of the whole amplitude, E_H largest at t = 0. */
export interface FieldMoment {
  /** Eighths of a period since t = 0. */
  readonly eighths: number;
  readonly h: number;
  readonly v: number;
  /** Where the field points, counter-clockwise from H for the receiver, in (−180, 180]; null where it is nothing. */
  readonly towardsDeg: number | null;
}

const EIGHTHS = 8;
// A field this short points nowhere that a drawing could show.
const NOTHING = 1e-9;

/** One period in eighths, t = T left out since it is t = 0 again. The field is the light's own: the same in every convention. */
export function fieldMoments(stokes: Stokes): readonly FieldMoment[] {
  const jones = stokesToJones(stokes);
  return Array.from({ length: EIGHTHS }, (_, eighths) => {
    const { h, v } = fieldAt(jones, radians((2 * Math.PI * eighths) / EIGHTHS));
    const nothing = Math.hypot(h, v) < NOTHING;
    return {
      eighths,
      h,
      v,
      towardsDeg: nothing ? null : toDegrees(radians(Math.atan2(snapped(v), snapped(h)))),
    };
  });
}

// −1e-17 beside −1 would point to −180° instead of 180°.
const snapped = (value: number) => (Math.abs(value) < NOTHING ? 0 : value);

const timeWords = ['0', 'T/8', 'T/4', '3T/8', 'T/2', '5T/8', '3T/4', '7T/8'];

export function timeWord(eighths: number): string {
  return timeWords[eighths] ?? '';
}
