import { degrees, toRadians } from '../../../shared/optics';
import { usedRetardance } from '../../../shared/protocol/solving-plates';
import type { Bench } from '../../../shared/schemas/benches';

export type WavelengthSlopes =
  | { readonly ok: true; readonly perNmRad: readonly number[] }
  | { readonly ok: false; readonly sentence: string };

/** How every plate's retardance at a bench follows the wavelength, rad/nm; or which plate nothing is known of, and why. */
export function wavelengthSlopes(
  bench: Pick<Bench, 'plates' | 'wavelengthNm' | 'temperatureC'>,
): WavelengthSlopes {
  const perNmRad: number[] = [];
  const unknown: string[] = [];
  for (const plate of bench.plates) {
    const { perNmDeg, reason } = usedRetardance(plate, bench);
    // No crystal's retardance stands still with the wavelength: 0 is the model's word for "nothing known".
    if (perNmDeg === 0) unknown.push(`${plate.name}: ${reason ?? 'no model'}`);
    perNmRad.push(toRadians(degrees(perNmDeg)));
  }
  return unknown.length === 0
    ? { ok: true, perNmRad }
    : {
        ok: false,
        sentence: `How the retardance follows the wavelength is not known of every plate (${unknown.join('; ')}). Write how it is built in the cabinet, or ask about a common retardance error.`,
      };
}
