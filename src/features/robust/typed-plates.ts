import { parseTypedNumber } from '../../lib/format';

export const FEWEST_PLATES = 2;
export const MOST_PLATES = 6;

const LARGEST_DEG = 3600;

export type TypedPlates =
  | { readonly ok: true; readonly retardancesDeg: readonly number[] }
  | { readonly ok: false; readonly sentence: string };

/** "180 180 180": retardances in degrees and beam order, apart by gaps; a sign of degree or `deg` behind each is taken. */
export function readTypedPlates(text: string): TypedPlates {
  const words = text.split(/[\s;]+/u).filter((word) => word !== '');
  if (words.length === 0) {
    return {
      ok: false,
      sentence: 'No plate is written. Write each retardance in degrees, like 180 180 180.',
    };
  }
  const retardancesDeg: number[] = [];
  for (const [index, word] of words.entries()) {
    const typed = parseTypedNumber(word.replace(/(?:°|deg)$/u, ''));
    if (!typed.ok) {
      const comma = typed.fault === 'comma' || word.includes(',');
      return {
        ok: false,
        sentence: comma
          ? `Plate ${index + 1}: “${word}” has a comma. Write a point in a number and a gap between plates.`
          : `Plate ${index + 1}: “${word}” is no retardance. Write degrees, like 180.`,
      };
    }
    if (!(typed.value > 0 && typed.value <= LARGEST_DEG)) {
      return {
        ok: false,
        sentence: `Plate ${index + 1}: a retardance is above 0 and at most ${LARGEST_DEG}°, not ${word}.`,
      };
    }
    retardancesDeg.push(typed.value);
  }
  const fault = plateCountFault(retardancesDeg.length);
  return fault === null ? { ok: true, retardancesDeg } : { ok: false, sentence: fault };
}

/** Why a composite can't be made of so many plates; null where it can. */
export function plateCountFault(count: number): string | null {
  if (count < FEWEST_PLATES) {
    return `${count === 1 ? 'One plate has' : 'No plate has'} nothing to cancel an error with. Use two to six plates.`;
  }
  return count > MOST_PLATES
    ? `${count} plates are more than the search takes. Use two to six plates.`
    : null;
}
