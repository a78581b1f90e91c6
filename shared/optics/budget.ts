import {
  addedInfidelity,
  expectedWithoutLeak,
  type Linearised,
  linearise,
  type UncertainParameter,
} from './budget-derivatives';
import {
  type BudgetProblem,
  checkBudgetProblem,
  type ParameterKind,
  type ParameterUnit,
} from './budget-problem';
import { tangentSpread, turnSpread } from './budget-spread';
import { quadraticFormQuantile } from './quantile';
import { stackQuaternion } from './retarder';

export {
  type BudgetProblem,
  type ParameterKind,
  type ParameterUnit,
  type SharedDrift,
  type UncertainPlate,
} from './budget-problem';

/** What one parameter adds to the expected infidelity. */
export interface Contribution {
  readonly kind: ParameterKind;
  /** Index in beam order; `null` for what isn't one plate's: the polariser, its leak, what is shared. */
  readonly plate: number | null;
  /** One standard deviation, in `unit`. Of an extinction: the leak itself, which is there always and not now and then. */
  readonly sigma: number;
  readonly unit: ParameterUnit;
  /** For a state ¼ σ² |∂p/∂parameter|², for a unitary ⅙ σ² |∂ω/∂parameter|². */
  readonly infidelity: number;
  /** Of the expected infidelity, 0 to 1. */
  readonly share: number;
  /** Share of the expected infidelity that would go if σ, or the leak, were halved. */
  readonly gainIfHalved: number;
}

export interface Budget {
  /** 1 − F of the setting itself plus the sum of all contributions. */
  readonly expectedInfidelity: number;
  /** 5 % and 95 % points of the first-order distribution of 1 − F. */
  readonly expectedLow: number;
  readonly expectedHigh: number;
  /** Largest first; equal ones in beam order. */
  readonly contributions: readonly Contribution[];
}

/**
 * First-order error budget of one setting, canonical frame. With p the state reached and J = ∂p/∂parameters by exact
 * derivatives, E[1 − F] = 1 − F(setting) + ¼ tr(J Σ Jᵀ) for independent parameters (a pure state's 1 − F is ¼|δp|²); for
 * a unitary the same with ⅙ and the turn that is left (average gate infidelity ⅔ sin²(ε/2) of a turn by ε).
 *
 * A polariser with a leak of ε passes (|in⟩⟨in| + ε|in⊥⟩⟨in⊥|)/(1 + ε), incoherently. The two go to opposite points, so with
 * q the 1 − F of the first the whole has (q + ε(1 − q))/(1 + ε) = q + ε/(1 + ε) · (1 − 2q), exactly.
 * @throws RangeError for a negative σ, a leak outside [0, 1] and a drift that doesn't fit the plates.
 */
export function errorBudget(problem: BudgetProblem): Budget {
  checkBudgetProblem(problem);
  const { goal, plates } = problem;
  const linearised = linearise(problem);
  const { parameters, reached } = linearised;
  const leak = leakOf(problem);
  const expectation = expectationOf(linearised, leak, null, 1);
  const contributions = contributionsOf(linearised, leak, expectation).sort(
    (a, b) => b.infidelity - a.infidelity,
  );
  const spread =
    goal.kind === 'prepare'
      ? tangentSpread(reached, goal.target, parameters)
      : turnSpread(stackQuaternion(plates), goal.target, parameters);
  const [low, high] = [quadraticFormQuantile(spread, 0.05), quadraticFormQuantile(spread, 0.95)];
  return {
    expectedInfidelity: expectation.leaked,
    expectedLow: leaked(low, leak),
    expectedHigh: leaked(high, leak),
    contributions,
  };
}

/** The expected infidelity of `errorBudget`, to the bit, without its distribution and ranking: for searches. */
export function expectedInfidelity(problem: BudgetProblem): number {
  checkBudgetProblem(problem);
  return leaked(expectedWithoutLeak(problem), leakOf(problem));
}

/**
 * The expected infidelity if the σ (or the leak) of one contribution were `factor` times what it is: ½ for "twice as good".
 * A dial's step and repeatability both change.
 * @param index into `errorBudget(problem).contributions`, largest first.
 * @throws RangeError for an index that isn't there and a negative factor, besides what `errorBudget` refuses.
 */
export function whatIf(problem: BudgetProblem, index: number, factor: number): number {
  if (!(factor >= 0 && factor < Infinity)) throw new RangeError(`a σ can't change by a factor of ${factor}`);
  const chosen = errorBudget(problem).contributions[index];
  if (chosen === undefined) throw new RangeError(`there is no contribution ${index}`);
  const linearised = linearise(problem);
  if (chosen.kind === 'extinction') {
    return expectationOf(linearised, Math.min(1, factor * chosen.sigma), null, 1).leaked;
  }
  // A shared drift of a kind could be there twice: its σ tells which one it is, and equal ones are interchangeable.
  const parameter =
    linearised.parameters.find(
      ({ kind, plate, sigma }) => kind === chosen.kind && plate === chosen.plate && sigma === chosen.sigma,
    ) ?? null;
  return expectationOf(linearised, leakOf(problem), parameter, factor).leaked;
}

interface Expectation {
  /** Of the light that the polariser is meant to pass. */
  readonly pure: number;
  /** With the polariser's leak. */
  readonly leaked: number;
}

function expectationOf(
  { ownInfidelity, parameters, weight }: Linearised,
  leak: number,
  changed: UncertainParameter | null,
  factor: number,
): Expectation {
  let pure = ownInfidelity;
  for (const parameter of parameters) {
    const added = addedInfidelity(weight, parameter.sigma, parameter.derivative);
    pure += parameter === changed ? factor * factor * added : added;
  }
  return { pure, leaked: leaked(pure, leak) };
}

function contributionsOf(
  { parameters, weight }: Linearised,
  leak: number,
  { pure, leaked: whole }: Expectation,
): Contribution[] {
  const share = (part: number): number => (whole > 0 ? part / whole : 0);
  // Less of a σ also leaves the leak more to spoil: (1 − ε)/(1 + ε) of what it gains stays gained.
  const kept = 1 - 2 * mixed(leak);
  const contributions = parameters.map((parameter): Contribution => {
    const { kind, plate, sigma, unit, derivative } = parameter;
    const infidelity = addedInfidelity(weight, sigma, derivative);
    return {
      kind,
      plate,
      sigma,
      unit,
      infidelity,
      share: share(infidelity),
      gainIfHalved: 0.75 * share(infidelity) * kept,
    };
  });
  if (leak > 0) {
    const infidelity = mixed(leak) * (1 - 2 * pure);
    contributions.push({
      kind: 'extinction',
      plate: null,
      sigma: leak,
      unit: 'ratio',
      infidelity,
      share: share(infidelity),
      gainIfHalved: share((mixed(leak) - mixed(leak / 2)) * (1 - 2 * pure)),
    });
  }
  return contributions;
}

function leakOf({ goal, extinction }: BudgetProblem): number {
  return goal.kind === 'prepare' ? (extinction ?? 0) : 0;
}

/** Part of the light behind the polariser that is in the wrong state. */
function mixed(leak: number): number {
  return leak / (1 + leak);
}

function leaked(infidelity: number, leak: number): number {
  return leak === 0 ? infidelity : infidelity + mixed(leak) * (1 - 2 * infidelity);
}
