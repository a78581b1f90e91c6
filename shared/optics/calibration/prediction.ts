import { type ModelledPlate, modelRetardance, retardanceAt, type Surroundings } from '../dispersion';
import { wrapSigned } from '../units';
import { INTERVAL_SIGMA, SETTLED_SIGMA } from './evidence';
import type { Stated } from './scan-rows';

/** What a maker states of a plate at its design wavelength, and how well the surroundings are known. */
export interface PredictionProblem {
  readonly plate: ModelledPlate;
  readonly designWavelengthNm: number;
  /** In degrees, with the maker's tolerance as σ. */
  readonly nominalDeg: Stated;
  readonly surroundings: Surroundings;
  readonly wavelengthSigmaNm: number;
  /** Of no use where a temperature is missing. */
  readonly temperatureSigmaK: number;
}

export type Prediction =
  | {
      readonly ok: true;
      /** In [0, 360). */
      readonly retardanceDeg: number;
      readonly wholeDeg: number;
      readonly sigmaDeg: number;
      /** What σ is made of: tolerance, wavelength, temperature. The published model itself is taken as exact. */
      readonly partsDeg: {
        readonly tolerance: number;
        readonly wavelength: number;
        readonly temperature: number;
      };
    }
  | { readonly ok: false; readonly reason: string };

const FULL_TURN_DEG = 360;

/**
 * The retardance that dispersion and temperature give a plate where it was scanned, with its σ to first order.
 * @throws RangeError unless the order is a whole number from 0.
 */
export function predictRetardance(problem: PredictionProblem): Prediction {
  const { plate, designWavelengthNm, nominalDeg, surroundings } = problem;
  const modelled = modelRetardance(plate, designWavelengthNm, nominalDeg.value, surroundings);
  if (!modelled.ok) return modelled;
  const { retardanceDeg, wholeDeg } = modelled;
  const order = Math.max(0, Math.round((wholeDeg - retardanceDeg) / FULL_TURN_DEG));
  const here = retardanceAt({ ...plate, order }, { retardanceDeg, ...surroundings }, surroundings);
  const designedDeg = nominalDeg.value + FULL_TURN_DEG * plate.order;
  const partsDeg = {
    tolerance: nominalDeg.sigma * (designedDeg === 0 ? 1 : wholeDeg / designedDeg),
    wavelength: Math.abs(here.perNmDeg) * problem.wavelengthSigmaNm,
    temperature:
      surroundings.temperatureC === null ? 0 : Math.abs(here.perKelvinDeg) * problem.temperatureSigmaK,
  };
  const { tolerance, wavelength, temperature } = partsDeg;
  const sigmaDeg = Math.sqrt(tolerance * tolerance + wavelength * wavelength + temperature * temperature);
  return { ok: true, retardanceDeg, wholeDeg, sigmaDeg, partsDeg };
}

/** A measurement beside a prediction, each number that a sentence about them needs. */
export interface RetardanceDistance {
  readonly measuredDeg: number;
  readonly predictedDeg: number;
  /** Measured − predicted, in (−180, 180]. */
  readonly deviationDeg: number;
  /** Of the deviation: both σ in quadrature. */
  readonly sigmaDeg: number;
  /** Size of the deviation in that σ; null where both are exact. */
  readonly sigmas: number | null;
  readonly larger: 'measured' | 'predicted' | 'neither';
  /** Within `INTERVAL_SIGMA`, apart from `SETTLED_SIGMA` on, or in between. */
  readonly verdict: 'agrees' | 'in-between' | 'apart';
  /** Which of δ and 360° − δ was compared. */
  readonly branch: 'as-measured' | 'other';
}

/**
 * How far a measured retardance lies from the model's, in degrees.
 * @param isBranchOpen whether 360° − δ may be meant as well: then the nearer one is compared.
 */
export function distanceFromModel(
  measured: Stated,
  predicted: Stated,
  isBranchOpen: boolean,
): RetardanceDistance {
  const apart = (valueDeg: number) => wrapSigned(valueDeg - predicted.value, FULL_TURN_DEG);
  const [own, other] = [apart(measured.value), apart(FULL_TURN_DEG - measured.value)];
  const isOther = isBranchOpen && Math.abs(other) < Math.abs(own);
  const deviationDeg = isOther ? other : own;
  const sigmaDeg = Math.sqrt(measured.sigma * measured.sigma + predicted.sigma * predicted.sigma);
  const sigmas = sigmaDeg > 0 ? Math.abs(deviationDeg) / sigmaDeg : null;
  const weight = sigmas ?? (deviationDeg === 0 ? 0 : Infinity);
  return {
    measuredDeg: isOther ? FULL_TURN_DEG - measured.value : measured.value,
    predictedDeg: predicted.value,
    deviationDeg,
    sigmaDeg,
    sigmas,
    larger: deviationDeg > 0 ? 'measured' : deviationDeg < 0 ? 'predicted' : 'neither',
    verdict: weight <= INTERVAL_SIGMA ? 'agrees' : weight < SETTLED_SIGMA ? 'in-between' : 'apart',
    branch: isOther ? 'other' : 'as-measured',
  };
}
