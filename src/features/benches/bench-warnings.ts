import { usedRetardance } from '../../../shared/protocol/solving-plates';
import { createBenchSchema } from '../../../shared/schemas/benches';
import type { Plate } from '../../../shared/schemas/cabinet';
import { elsewhereSentence, usedElsewhere } from './elsewhere-words';

/** What a person should know before these plates stand in this bench; the server refuses a plate that stands elsewhere. */
export function benchWarnings(
  plates: readonly Plate[],
  bench: { readonly wavelengthNm: number; readonly temperatureC: number | null },
  benchId: string | null,
): readonly string[] {
  const { shape } = createBenchSchema;
  // Of a wavelength or a temperature that the form refuses nothing follows.
  const knowsLight = shape.wavelengthNm.safeParse(bench.wavelengthNm).success;
  const { data: temperatureC = null } = shape.temperatureC.safeParse(bench.temperatureC);
  const here = { wavelengthNm: bench.wavelengthNm, temperatureC };
  return [...new Set(plates)].flatMap((plate) => {
    const warnings: string[] = [];
    const used = knowsLight ? usedRetardance(plate, here) : null;
    if (used !== null && usedElsewhere(plate, used, here)) {
      warnings.push(elsewhereSentence(plate, used, here));
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
