import { fixed, formatChange, withTrueMinus } from '../../lib/format';

const SHOWN_DECIMALS = 3;
const COPIED_DECIMALS = 6;
// Half of the last decimal that is shown: smaller is nothing on the page.
const NOTHING_SHOWN = 5e-4;
const NOTHING_COPIED = 5e-7;

/** A real number as the pages of this feature show it: `−0.643`. */
export function writtenReal(value: number): string {
  return withTrueMinus(fixed(value, SHOWN_DECIMALS));
}

/** A complex number, three decimals, parts that vanish left out: `0.399+0.386i`. */
export function writtenComplex(re: number, im: number): string {
  if (Math.abs(im) < NOTHING_SHOWN) return writtenReal(re);
  if (Math.abs(re) < NOTHING_SHOWN) return `${writtenReal(im)}i`;
  return `${writtenReal(re)}${formatChange(im, SHOWN_DECIMALS)}i`;
}

/** As it is copied: ASCII, six decimals. */
export function plainReal(value: number): string {
  return fixed(value, COPIED_DECIMALS);
}

/** As it is copied, in the form that our own fields read back. */
export function plainComplex(re: number, im: number): string {
  if (Math.abs(im) < NOTHING_COPIED) return plainReal(re);
  if (Math.abs(re) < NOTHING_COPIED) return `${plainReal(im)}i`;
  const imaginary = plainReal(im);
  return `${plainReal(re)}${imaginary.startsWith('-') ? '' : '+'}${imaginary}i`;
}
