import { NOMINAL_DEG } from '../optics/dispersion';
import { type NominalRetardance, type Prediction, predictRetardance } from '../optics/calibration';
import type { Plate } from '../schemas/cabinet';

/** What of a plate says what it should retard. */
export type DescribedPlate = Pick<
  Plate,
  'kind' | 'designWavelengthNm' | 'construction' | 'material' | 'order'
>;

export interface MeasuredBefore {
  readonly wavelengthNm: number;
  readonly retardanceDeg: number;
  readonly retardanceSigmaDeg: number;
  readonly isBranchOpen: boolean;
}

/** Makers' tolerances, λ/100 of a crystalline zero-order plate at worst and λ/50 of others: common practice, from memory (references.md, 10). */
const TOLERANCE_DEG = { crystalline: 3.6, other: 7.2 } as const;
/** Without a material, how far a plate may be from the thin plate's δ ∝ 1/λ: as a share of what that law moves it. */
const UNKNOWN_LAW_SHARE = 0.3;
/** Nearer than this a retardance is measured at the same wavelength. */
const SAME_WAVELENGTH_NM = 0.5;

interface Surroundings {
  readonly wavelengthNm: number;
  readonly temperatureC: number | null;
}

/** The retardance that material and construction give a half- or quarter-wave plate there, or why nothing is known. */
export function predictedRetardance(plate: DescribedPlate, surroundings: Surroundings): Prediction {
  const { kind, designWavelengthNm, construction, material, order } = plate;
  if (kind === 'other') return { ok: false, reason: 'nobody says what the plate was made to retard' };
  const crystalline = construction !== 'multi-order' && material !== null;
  return predictRetardance({
    plate: { construction, material, order },
    designWavelengthNm,
    nominalDeg: {
      value: NOMINAL_DEG[kind],
      sigma: crystalline ? TOLERANCE_DEG.crystalline : TOLERANCE_DEG.other,
    },
    surroundings,
    wavelengthSigmaNm: 0,
    temperatureSigmaK: 0,
  });
}

/**
 * What a scan may take for granted of a plate's retardance, to tell δ from 360° − δ: the model's value, or of a plate without
 * a model that is no multi-order one the law of a thin plate with a generous σ, or of an odd plate what was measured before.
 */
export function nominalRetardance(
  plate: DescribedPlate,
  surroundings: Surroundings,
  before: MeasuredBefore | null,
): NominalRetardance | null {
  const { kind, designWavelengthNm, construction } = plate;
  if (kind === 'other') {
    const isHere =
      before !== null &&
      !before.isBranchOpen &&
      Math.abs(before.wavelengthNm - surroundings.wavelengthNm) <= SAME_WAVELENGTH_NM;
    if (!isHere) return null;
    const sigmaDeg = Math.max(before.retardanceSigmaDeg, TOLERANCE_DEG.crystalline);
    return { kind, retardanceDeg: before.retardanceDeg, sigmaDeg };
  }
  const predicted = predictedRetardance(plate, surroundings);
  if (predicted.ok) return { kind, retardanceDeg: predicted.retardanceDeg, sigmaDeg: predicted.sigmaDeg };
  if (construction === 'multi-order') return null;
  const designedDeg = NOMINAL_DEG[kind];
  const retardanceDeg = (designedDeg * designWavelengthNm) / surroundings.wavelengthNm;
  const moved = UNKNOWN_LAW_SHARE * Math.abs(retardanceDeg - designedDeg);
  return {
    kind,
    retardanceDeg,
    sigmaDeg: Math.sqrt(TOLERANCE_DEG.other * TOLERANCE_DEG.other + moved * moved),
  };
}
