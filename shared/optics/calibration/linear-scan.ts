import type { DialDirection } from '../dial';
import { cos } from '../elementary';
import { degrees, radians, toDegrees, toRadians, wrap } from '../units';
import { type CoefficientProblem, fitCoefficients, parameterCovariance } from './coefficient-fit';
import { misfitSigmas } from './evidence';
import { type FaultHarmonic, faultHarmonics } from './fault-harmonics';
import type { Basis } from './harmonic-basis';
import { DRIFT, LEAK, linearModel, linearStart, MODULATION, POWER, X0 } from './linear-model';
import { linearFinding, offsetEstimate, type PlateFinding } from './linear-reading';
import { nominalProblem, type NominalRetardance } from './open-questions';
import { suspectedRows } from './outliers';
import { type ScanRefusal, refuse } from './refusal';
import { linearRetardance } from './retardance-estimate';
import { residualsOf, type RowResidual } from './row-residuals';
import {
  isSigma,
  LARGEST_LEAK,
  leakProblem,
  type Ports,
  type ScanRow,
  scanSamples,
  type Stated,
} from './scan-rows';
import { flatProblem, spectrum } from './spectrum';
import { type ScanWarning, warningsOf } from './warnings';

/** A scan of a plate between two linear polarisers, the first one along H. */
export interface LinearScan {
  /** In the order of time. Dial angles in any order, evenly spaced or not. */
  readonly rows: readonly ScanRow[];
  readonly direction: DialDirection;
  /** What crossed polarisers let through without a plate, as a share of both ports; null to fit it where that is possible. */
  readonly leak: Stated | null;
  /** Power of both ports together at the first row, in the rows' unit; of use for one port only. */
  readonly power: Stated | null;
  readonly nominal: NominalRetardance | null;
  /** Places of rows not to use. They keep their place in time, and get a residual. */
  readonly leftOut: readonly number[];
}

/** What both kinds of scan tell about how well they were fitted. */
export interface FitQuality {
  /** What was known beforehand included. */
  readonly chiSquared: number;
  readonly degreesOfFreedom: number;
  /** `rows`: σ as stated. `scatter`: none was; the scatter about the harmonics set one for all, and χ² says nothing. */
  readonly sigmaFrom: 'rows' | 'scatter';
  /** That one σ, in the values' unit; else null. */
  readonly scatter: number | null;
  readonly rows: readonly RowResidual[];
  /** Places of rows in use that look like outliers, for a person to judge. */
  readonly suspected: readonly number[];
  /** Null where the rows are too few to look for them. */
  readonly faults: readonly FaultHarmonic[] | null;
  readonly warnings: readonly ScanWarning[];
}

export type LinearParameter = 'offsetDeg' | 'modulation' | 'leak' | 'power' | 'drift';

export interface FittedParameter {
  readonly value: number;
  /** Null for what was held. */
  readonly sigma: number | null;
}

export interface LinearScanFit extends PlateFinding, FitQuality {
  readonly ok: true;
  readonly ports: Ports;
  readonly direction: DialDirection;
  /**
   * `modulation` is sin²(δ/2), cut at 1; `power` that of both ports at the first row, `drift` its change to the last one
   * as a share. Of one port that tells the zero only, offset and drift have a meaning, the others don't.
   */
  readonly parameters: Readonly<Record<LinearParameter, FittedParameter>>;
  /** The parameters that were free, in the order of the covariance's rows. */
  readonly covarianceOf: readonly LinearParameter[];
  readonly covariance: readonly (readonly number[])[];
}

const NAMES: readonly LinearParameter[] = ['offsetDeg', 'modulation', 'leak', 'power', 'drift'];

function statementProblem({ leak, power, nominal, direction }: LinearScan): ScanRefusal | null {
  if (power !== null && !(power.value > 0 && power.value < Infinity && isSigma(power.sigma))) {
    const what = 'The power that enters is a finite number above 0 with a σ from 0, got';
    return refuse(
      'statement',
      `${what} ${power.value} and ${power.sigma}. State it in the unit of the rows.`,
    );
  }
  if (Math.abs(direction) !== 1)
    return refuse('statement', `A dial runs in direction 1 or −1, not ${direction}.`);
  return leakProblem(leak) ?? nominalProblem(nominal);
}

const held = (value: number): Stated => ({ value, sigma: 0 });

/** Offset, retardance and what stays open of a plate scanned between crossed and/or parallel polarisers. */
export function fitLinearScan(scan: LinearScan): LinearScanFit | ScanRefusal {
  const wrong = statementProblem(scan);
  if (wrong !== null) return wrong;
  const read = scanSamples(scan.rows, scan.direction, scan.leftOut);
  if (!read.ok) return read;
  const { ports, samples } = read;
  const { scale } = samples;
  const basis: Basis = { signal: [4], drifts: ports !== 'both', faults: [] };
  const found = spectrum(samples, basis);
  if ('ok' in found) return found;
  const flat = flatProblem(found, [1]);
  if (flat !== null) return flat;

  const power =
    scan.power === null ? null : { value: scan.power.value / scale, sigma: scan.power.sigma / scale };
  const { coefficients: target, normal, squares } = found.fit;
  const { start, unitPower } = linearStart(ports, target, scan.leak, power);
  const isTold = ports === 'both' || power !== null || (ports === 'parallel' && scan.leak !== null);
  if (isTold && !((start[LEAK] ?? 0) <= LARGEST_LEAK)) {
    const what = 'The crossed port has nearly half of the light or more wherever the plate stands.';
    return refuse('ports-swapped', `${what} Check which port is crossed, and the leak and power stated.`);
  }
  const known = [
    null,
    null,
    isTold ? scan.leak : null,
    ports === 'both' ? held(1) : isTold ? power : held(unitPower),
    ports === 'both' ? held(0) : null,
  ];
  const problem: CoefficientProblem = { model: linearModel(ports), target, normal, known };
  const free = fitCoefficients(problem, start);
  const covariance = parameterCovariance(free);
  const retardance = isTold ? linearRetardance(problem, free, found.freedom) : null;
  if (covariance === null || (isTold && retardance === null))
    return refuse(
      'angles',
      'The scan leaves a quantity open. Measure at more angles, or state leak and power.',
    );

  const fit = retardance?.fit ?? free;
  const units = [toDegrees(radians(scan.direction)), 1, 1, scale, 1];
  const sigmaOf = (p: number) =>
    fit.isFree[p] === true || free.isFree[p] === true
      ? Math.sqrt(covariance[p * NAMES.length + p] ?? 0) * Math.abs(units[p] ?? 1)
      : null;
  const parameter = (p: number): FittedParameter => ({
    value: (fit.parameters[p] ?? 0) * (units[p] ?? 1),
    sigma: sigmaOf(p),
  });
  const parameters = {
    offsetDeg: { value: wrap(parameter(X0).value, 90), sigma: sigmaOf(X0) },
    modulation: parameter(MODULATION),
    leak: parameter(LEAK),
    power: parameter(POWER),
    drift: parameter(DRIFT),
  };
  const offset = offsetEstimate(parameters.offsetDeg.value, sigmaOf(X0) ?? 0, found.freedom);
  const covered = NAMES.flatMap((name, p) => (free.isFree[p] === true ? [{ name, p }] : []));
  const chiSquared = squares + fit.excess;
  // A number that was stated with a σ is a row of its own, and takes back the one that it costs.
  const degreesOfFreedom = samples.count - known.filter((stated) => stated === null).length;
  const faults = faultHarmonics(samples, basis, [1, 2]);
  const readAlone = (row: number) => {
    const one = scan.rows[row];
    const alone = one === undefined ? null : scanSamples([one], scan.direction, []);
    return alone?.ok === true && alone.ports === ports ? alone.samples : null;
  };
  return {
    ok: true,
    ports,
    direction: scan.direction,
    ...linearFinding(offset, retardance, scan.nominal, ports === 'parallel' ? 'leak-or-power' : 'power'),
    parameters,
    covarianceOf: covered.map(({ name }) => name),
    covariance: covered.map(({ p }) =>
      covered.map(({ p: q }) => (covariance[p * NAMES.length + q] ?? 0) * (units[p] ?? 1) * (units[q] ?? 1)),
    ),
    chiSquared,
    degreesOfFreedom,
    sigmaFrom: found.scatter === null ? 'rows' : 'scatter',
    scatter: found.scatter === null ? null : found.scatter * scale,
    rows: residualsOf(scan.rows.length, samples, found.scatter, readAlone, (angleRad, time) => {
      const source = 1 + (fit.parameters[DRIFT] ?? 0) * (time + 0.5);
      return { value: source * steadyValue(ports, fit.parameters, angleRad), source };
    }),
    suspected: suspectedRows(samples, basis),
    faults,
    warnings: warningsOf(
      { kind: 'misfit', sigmas: found.scatter === null ? misfitSigmas(chiSquared, degreesOfFreedom) : 0 },
      faults ?? [],
      retardance?.overFullSigmas ?? 0,
      isTold && scan.leak === null ? parameters.leak : null,
    ),
  };
}

function steadyValue(ports: Ports, parameters: Float64Array, angleRad: number): number {
  const [x0 = 0, modulation = 0, leak = 0, power = 1] = parameters;
  const crossed = leak + ((1 - 2 * leak) * modulation * (1 - cos(4 * (angleRad - x0)))) / 2;
  return power * (ports === 'parallel' ? 1 - crossed : crossed);
}

/** The fitted curve for a steady source: a share of both ports, or the port's power, at a reading of the dial. */
export function linearScanCurve(fit: LinearScanFit): (dialDeg: number) => number {
  const { offsetDeg, modulation, leak, power } = fit.parameters;
  const parameters = Float64Array.of(
    fit.direction * toRadians(degrees(offsetDeg.value)),
    modulation.value,
    leak.value,
    power.value,
  );
  return (dialDeg) =>
    steadyValue(fit.ports, parameters, fit.direction * toRadians(degrees(wrap(dialDeg, 360))));
}
