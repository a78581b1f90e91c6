import type { DialDirection } from '../dial';
import { type Stokes, stokesLength } from '../stokes';
import { degrees, radians, toDegrees, toRadians, wrap } from '../units';
import { type CoefficientFit, type CoefficientProblem, parameterCovariance } from './coefficient-fit';
import { excessSigmas, misfitSigmas, SETTLED_SIGMA } from './evidence';
import { faultHarmonics } from './fault-harmonics';
import type { Basis } from './harmonic-basis';
import { offsetEstimate, onOtherBranch, type PlateFinding } from './linear-reading';
import type { FitQuality, FittedParameter, LinearScanFit } from './linear-scan';
import { chooseBranch, nominalProblem, type NominalRetardance } from './open-questions';
import { suspectedRows } from './outliers';
import { fitWith } from './profile';
import { type ScanRefusal, refuse } from './refusal';
import { estimateOf, otherInStrip, renamed, rivalsOf } from './rotating-estimate';
import {
  type KnownInput,
  type LinearPrior,
  priorSize,
  ROTATED_DRIFT,
  ROTATED_LEAK,
  ROTATED_POWER,
  ROTATED_RETARDANCE,
  ROTATED_X0,
  rotatingModel,
  rotatingPlateRow,
  withPrior,
} from './rotating-model';
import { inStrip, landscapeOf, polish, valleys } from './rotating-search';
import { rotatingFinding } from './rotating-reading';
import { residualsOf } from './row-residuals';
import { isSigma, leakProblem, type RotatingRow, rotatingSamples, type Stated } from './scan-rows';
import { flatProblem, type Spectrum, spectrum } from './spectrum';
import { warningsOf } from './warnings';

/** A scan of a plate that turns behind known light, in front of a fixed linear analyser. */
export interface RotatingScan {
  /** In the order of time. */
  readonly rows: readonly RotatingRow[];
  readonly direction: DialDirection;
  /** The light that enters the plate, canonical, its length the degree of polarisation. */
  readonly input: Stokes;
  /** Counter-clockwise from H. */
  readonly analyserDeg: number;
  /** Share of the blocked polarisation that the analyser passes; null for an ideal one. */
  readonly leak: Stated | null;
  /** What a scan between linear polarisers told of the same seat, or null to fit this scan by itself. */
  readonly before: LinearScanFit | null;
  readonly nominal: NominalRetardance | null;
  readonly leftOut: readonly number[];
}

export type RotatingParameter = 'offsetDeg' | 'retardanceDeg' | 'leak' | 'power' | 'drift';

export interface RotatingScanFit extends PlateFinding, FitQuality {
  readonly ok: true;
  readonly direction: DialDirection;
  readonly input: Stokes;
  readonly analyserDeg: number;
  /** By how many σ the plate fits better than any that turns the other way; settled from `SETTLED_SIGMA` on. */
  readonly axisSigmas: number;
  /** `power`: of the light that enters, at the first row. */
  readonly parameters: Readonly<Record<RotatingParameter, FittedParameter>>;
  readonly covarianceOf: readonly RotatingParameter[];
  readonly covariance: readonly (readonly number[])[];
}

const NAMES: readonly RotatingParameter[] = ['offsetDeg', 'retardanceDeg', 'leak', 'power', 'drift'];
/** Rounding in a Stokes vector that should have length 1. */
const LENGTH_SLACK = 1e-9;

function statementProblem(scan: RotatingScan): ScanRefusal | null {
  const { direction, input, analyserDeg, leak, nominal, before } = scan;
  if (Math.abs(direction) !== 1)
    return refuse('statement', `A dial runs in direction 1 or −1, not ${direction}.`);
  if (!(stokesLength(input) <= 1 + LENGTH_SLACK)) {
    const what = `The input's Stokes vector has three finite parts and a length of at most 1, got`;
    return refuse('input', `${what} (${input.join(', ')}). State it for intensity 1.`);
  }
  if (!Number.isFinite(analyserDeg))
    return refuse(
      'input',
      `The analyser's azimuth is a finite number of degrees, got ${analyserDeg}. State it.`,
    );
  if (before !== null && before.direction !== direction)
    return refuse(
      'statement',
      'The scan before has the dial run the other way. Take the direction of one mount.',
    );
  if (before !== null && !isSigma(before.offset.sigmaDeg))
    return refuse('statement', 'The offset of the scan before has no finite σ. Leave that scan out.');
  return leakProblem(leak) ?? nominalProblem(nominal);
}

function priorOf(before: LinearScanFit, direction: DialDirection): LinearPrior {
  const { modulation, offsetDeg } = before.parameters;
  return {
    x0: direction * toRadians(degrees(offsetDeg.value)),
    x0Sigma: toRadians(degrees(before.offset.sigmaDeg)),
    modulation:
      before.retardance === null || modulation.sigma === null
        ? null
        : { value: modulation.value, sigma: modulation.sigma },
  };
}

/** Offset and retardance of a plate behind known light, and whether the light tells it from the plate that undoes it. */
export function fitRotatingScan(scan: RotatingScan): RotatingScanFit | ScanRefusal {
  const wrong = statementProblem(scan);
  if (wrong !== null) return wrong;
  const samples = rotatingSamples(scan.rows, scan.direction, scan.leftOut);
  if ('ok' in samples) return samples;
  const basis: Basis = { signal: [2, 4], drifts: true, faults: [] };
  const found = spectrum(samples, basis);
  if ('ok' in found) return found;
  const prior = scan.before === null ? null : priorOf(scan.before, scan.direction);
  const flat = prior === null ? flatProblem(found, [1, 3]) : null;
  if (flat !== null) return flat;

  const input: KnownInput = { stokes: scan.input, analyserRad: toRadians(degrees(scan.analyserDeg)) };
  const leak = scan.leak ?? { value: 0, sigma: 0 };
  const problem: CoefficientProblem = {
    model: rotatingModel(input, prior),
    ...withPrior(found.fit.coefficients, found.fit.normal, prior),
    known: [null, null, leak, null, null],
  };
  const landscape = landscapeOf(problem, input, prior, leak.value);
  const best = valleys(landscape, { fromX0: 0, width: Math.PI })
    .map((spot) => polish(problem, spot, leak.value))
    .reduce<CoefficientFit | null>((a, b) => (a === null || b.excess < a.excess ? b : a), null);
  if (best === null)
    return refuse(
      'angles',
      'The scan does not follow the plate in a way that can be fitted. Measure at more angles.',
    );
  const first = renamed(problem, best, inStrip(best));
  const firstEstimate = estimateOf(problem, first, found.freedom);
  const { retardanceDeg, sigmaDeg } = firstEstimate.estimate;
  const choice = chooseBranch({ value: retardanceDeg, sigma: sigmaDeg }, scan.nominal, firstEstimate.isBlind);
  const isOther = choice.settled && !choice.isFirst;
  const fit = isOther ? renamed(problem, first, otherInStrip(first)) : first;
  const estimate = isOther ? onOtherBranch(firstEstimate.estimate) : firstEstimate.estimate;
  const inner = parameterCovariance(fit);
  const covariance =
    inner ??
    parameterCovariance(fitWith(problem, fit.parameters, ROTATED_RETARDANCE, fit.parameters[1] ?? 0));
  if (covariance === null)
    return refuse('angles', 'The scan leaves a quantity open. Measure at more angles, or state the leak.');

  const rivals = rivalsOf(problem, landscape, fit, found.freedom);
  const { scale } = samples;
  const degreesPerRadian = toDegrees(radians(1));
  const units = [scan.direction * degreesPerRadian, degreesPerRadian, 1, scale, 1];
  const isFree = (p: number) => fit.isFree[p] === true && (p !== ROTATED_RETARDANCE || inner !== null);
  const at = (p: number, q: number) =>
    (covariance[p * NAMES.length + q] ?? 0) * (units[p] ?? 1) * (units[q] ?? 1);
  const parameter = (p: number): FittedParameter => ({
    value: (fit.parameters[p] ?? 0) * (units[p] ?? 1),
    sigma: isFree(p) ? Math.sqrt(at(p, p)) : null,
  });
  const offsetDeg = { ...parameter(ROTATED_X0), value: wrap(parameter(ROTATED_X0).value, 180) };
  const chiSquared = found.fit.squares + fit.excess;
  const degreesOfFreedom = samples.count + priorSize(prior) - 4;
  // What no plate explains although the harmonics do: it counts against the stated light, not against the rows.
  const unlikeSigmas = unlikeLight(fit.excess, problem.model.size - 4, found);
  const faults = faultHarmonics(samples, basis, [1]);
  const covered = NAMES.flatMap((name, p) => (isFree(p) ? [{ name, p }] : []));
  const readAlone = (row: number) => {
    const one = scan.rows[row];
    const alone = one === undefined ? null : rotatingSamples([one], scan.direction, []);
    return alone === null || 'ok' in alone ? null : alone;
  };
  return {
    ok: true,
    direction: scan.direction,
    input: scan.input,
    analyserDeg: scan.analyserDeg,
    ...rotatingFinding({
      offset: offsetEstimate(offsetDeg.value, offsetDeg.sigma ?? 0, found.freedom),
      retardance: estimate,
      isBlind: firstEstimate.isBlind,
      rivals: {
        acrossSigmas: rivals.acrossSigmas,
        others: rivals.others.map(({ x0, retardance, sigmas }) => ({
          offsetDeg: wrap(scan.direction * toDegrees(radians(x0)), 180),
          retardanceDeg: toDegrees(radians(retardance)),
          sigmas,
        })),
      },
      choice,
    }),
    axisSigmas: rivals.acrossSigmas,
    parameters: {
      offsetDeg,
      retardanceDeg: parameter(ROTATED_RETARDANCE),
      leak: parameter(ROTATED_LEAK),
      power: parameter(ROTATED_POWER),
      drift: parameter(ROTATED_DRIFT),
    },
    covarianceOf: covered.map(({ name }) => name),
    covariance: covered.map(({ p }) => covered.map(({ p: q }) => at(p, q))),
    chiSquared,
    degreesOfFreedom,
    sigmaFrom: found.scatter === null ? 'rows' : 'scatter',
    scatter: found.scatter === null ? null : found.scatter * scale,
    rows: residualsOf(scan.rows.length, samples, found.scatter, readAlone, (angleRad, time) => {
      const source = 1 + (fit.parameters[ROTATED_DRIFT] ?? 0) * (time + 0.5);
      return { value: source * steadyValue(input, fit.parameters, angleRad), source };
    }),
    suspected: suspectedRows(samples, basis),
    faults,
    warnings: warningsOf(
      unlikeSigmas >= SETTLED_SIGMA
        ? { kind: 'other-light', sigmas: unlikeSigmas }
        : { kind: 'misfit', sigmas: found.scatter === null ? misfitSigmas(chiSquared, degreesOfFreedom) : 0 },
      faults ?? [],
      0,
      null,
    ),
  };
}

/**
 * How far a plate behind the stated light is from making these harmonics, in σ. Rows that scatter more than their σ say are
 * measured by their scatter: σ stated too small is no fault of the light.
 */
function unlikeLight(excess: number, count: number, { fit, freedom }: Spectrum): number {
  const spread = fit.squares / fit.freedom;
  return freedom === null && fit.freedom > 0 && spread > 1
    ? excessSigmas(excess / spread, count, fit.freedom)
    : excessSigmas(excess, count, freedom);
}

function steadyValue(
  { stokes, analyserRad }: KnownInput,
  parameters: Float64Array,
  angleRad: number,
): number {
  const [x0 = 0, retardanceRad = 0, leak = 0, power = 1] = parameters;
  const [a, b, c, d] = rotatingPlateRow(angleRad - x0, retardanceRad, analyserRad);
  return power * (a + (1 - 2 * leak) * (b * stokes[0] + c * stokes[1] + d * stokes[2]));
}

/** The fitted curve for a steady source: the power behind the analyser at a reading of the dial. */
export function rotatingScanCurve(fit: RotatingScanFit): (dialDeg: number) => number {
  const { offsetDeg, retardanceDeg, leak, power } = fit.parameters;
  const parameters = Float64Array.of(
    fit.direction * toRadians(degrees(offsetDeg.value)),
    toRadians(degrees(retardanceDeg.value)),
    leak.value,
    power.value,
  );
  const input = { stokes: fit.input, analyserRad: toRadians(degrees(fit.analyserDeg)) };
  return (dialDeg) => steadyValue(input, parameters, fit.direction * toRadians(degrees(wrap(dialDeg, 360))));
}
