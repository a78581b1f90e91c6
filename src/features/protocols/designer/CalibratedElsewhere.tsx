import type { Bench } from '../../../../shared/schemas/benches';
import { calibratedElsewhere } from '../../benches';

/** Says which plates were measured at another wavelength than they are used at here: every angle below relies on that number. */
export function CalibratedElsewhere({ bench }: { readonly bench: Bench }) {
  const elsewhere = bench.plates.filter((plate) => calibratedElsewhere(plate, bench.wavelengthNm));
  if (elsewhere.length === 0) return null;
  const plates = elsewhere
    .map(({ name, calibration }) => `${name} at ${calibration.wavelengthNm} nm`)
    .join(', ');
  return (
    <p className="mt-0 mb-2 text-s font-strong text-fault">
      Measured {plates}; this bench runs at {bench.wavelengthNm} nm, where the retardance is another one.
    </p>
  );
}
