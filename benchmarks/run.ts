import { radians } from '../shared/optics/units';
import {
  climbAll,
  estimateAll,
  LEAST_BFGS_FACTOR,
  MOST_LOG_LIKELIHOOD_GAP,
  scipyLikeliest,
  tomographies,
} from './likeliest-state';
import { expectationNanoseconds, MONTE_CARLO_DRAWS, monteCarloSeconds, numpyMonteCarlo } from './monte-carlo';
import { npmOptimiser } from './npm-optimiser';
import {
  type Angles,
  forwardThree,
  LEAST_SCIPY_FACTOR,
  MOST_FORWARD_EVALUATIONS,
  multiStartThree,
  scipyThree,
  solveThree,
  threePlateProblems,
} from './three-plates';
import { forward, multiStart, problems, solveAll } from './two-plates';

/*
 * Costs as ratios within one run on one core: seconds say more about the machine than about the code. The limits are those
 * of the brief's table (optics.md, 10). Rows whose other side is Python are left out where there is no Python with scipy.
 */

const LIMIT_TWO_PLATES = 250;
const ROUNDS = 40;

/** Least time of many short rounds, in nanoseconds for each of `count` pieces of work: other work on the machine only adds. */
function nanoseconds(count: number, work: () => number): { readonly each: number; readonly result: number } {
  let least = Infinity;
  let result = 0;
  for (let round = 0; round < ROUNDS; round += 1) {
    const start = performance.now();
    result = work();
    least = Math.min(least, performance.now() - start);
  }
  return { each: (least * 1e6) / count, result };
}

const lines: string[] = [];
let missed = 0;

function row(what: string, value: string, limit: string, holds: boolean): void {
  if (!holds) missed += 1;
  lines.push(`${what.padEnd(58)} ${value.padStart(12)}   ${limit}${holds ? '' : '   MISSED'}`);
}

function twoPlates(): void {
  const list = problems(400);
  const angles = Array.from({ length: 32 }, (_, k) => radians((k * Math.PI) / 32));
  const evaluation = nanoseconds(list.length * angles.length, () => {
    let sum = 0;
    for (const problem of list)
      for (const angle of angles) sum += forward(problem, angle, radians(angle + 0.3))[2];
    return sum;
  });
  const solving = nanoseconds(list.length, () => solveAll(list));
  const ratio = solving.each / evaluation.each;
  row(
    'two-plate preparation, all solutions',
    ratio.toFixed(0),
    `forward evaluations, at most ${LIMIT_TWO_PLATES}`,
    ratio <= LIMIT_TWO_PLATES,
  );
  const few = list.slice(0, 20);
  const start = performance.now();
  const found = few.reduce((sum, problem) => sum + multiStart(problem, 60), 0);
  const searching = ((performance.now() - start) * 1e6) / few.length;
  row(
    '  60-start least squares of our own, same pairs',
    (searching / solving.each).toFixed(0),
    `times as costly; ${(found / few.length).toFixed(2)} of ${(solveAll(few) / few.length).toFixed(2)} settings found`,
    true,
  );
}

function threePlates(): void {
  for (const plates of ['ideal', 'calibrated'] as const) {
    const list = threePlateProblems(150, plates);
    const angles: readonly Angles[] = Array.from({ length: 16 }, (_, k) => [
      radians(0.1 + k * 0.19),
      radians(0.7 + k * 0.17),
      radians(1.3 + k * 0.13),
    ]);
    const evaluation = nanoseconds(list.length * angles.length, () => {
      let sum = 0;
      for (const problem of list) for (const at of angles) sum += forwardThree(problem, at).w;
      return sum;
    });
    const solving = nanoseconds(list.length, () => solveThree(list));
    const ratio = solving.each / evaluation.each;
    const bounded = plates === 'ideal';
    row(
      `${plates} three-plate unitary, all solutions`,
      ratio.toFixed(0),
      `forward evaluations${bounded ? `, at most ${MOST_FORWARD_EVALUATIONS}` : ''}`,
      !bounded || ratio <= MOST_FORWARD_EVALUATIONS,
    );
    if (plates === 'calibrated') others(list.slice(0, 20), solving.each);
  }
}

function others(few: ReturnType<typeof threePlateProblems>, eachNs: number): void {
  let start = performance.now();
  const own = few.reduce((sum, problem) => sum + multiStartThree(problem, 60), 0);
  let each = ((performance.now() - start) * 1e6) / few.length;
  row(
    '  60-start least squares of our own, same triples',
    (each / eachNs).toFixed(0),
    `times as costly; ${own} of ${solveThree(few)} settings found`,
    true,
  );
  start = performance.now();
  const general = few.map(npmOptimiser);
  each = ((performance.now() - start) * 1e6) / few.length;
  const found = general.reduce((sum, one) => sum + one.found, 0);
  const wanted = general.reduce((sum, one) => sum + one.wanted, 0);
  row(
    '  general least squares from npm, until the same set',
    (each / eachNs).toFixed(0),
    `times as costly; ${found} of ${wanted} settings found`,
    true,
  );
  const scipy = scipyThree(few);
  if (scipy === null) {
    lines.push('  scipy is not here: its row is left out');
    return;
  }
  const factor = (scipy.secondsEach * 1e9) / eachNs;
  row(
    '  scipy least_squares, until the same set',
    factor.toFixed(0),
    `times as costly, at least ${LEAST_SCIPY_FACTOR}; ${scipy.complete} of ${few.length} sets complete`,
    factor >= LEAST_SCIPY_FACTOR,
  );
}

function monteCarlo(): void {
  const ours = monteCarloSeconds();
  row('first-order expectation, three plates', expectationNanoseconds().toFixed(0), 'ns', true);
  const numpy = numpyMonteCarlo();
  if (numpy === null) {
    lines.push('  numpy is not here: its row is left out');
    return;
  }
  const whole = numpy.secondsWhole / ours;
  const blocks = numpy.secondsBlocks / ours;
  row(
    `Monte Carlo budget, 3 plates × ${MONTE_CARLO_DRAWS} draws, numpy's whole arrays`,
    whole.toFixed(2),
    'times as costly as ours, at least 1',
    whole >= 1,
  );
  row('  numpy in blocks that stay in the cache', blocks.toFixed(2), 'times as costly as ours', true);
}

function likeliestState(): void {
  const list = tomographies(100);
  const whole = nanoseconds(list.length, () => estimateAll(list));
  const kernel = nanoseconds(list.length, () => climbAll(list));
  row(
    'one-qubit maximum likelihood, 6 settings, largest gap of log L',
    whole.result.toExponential(1),
    `certified, at most ${MOST_LOG_LIKELIHOOD_GAP}; ${(whole.each / 1000).toFixed(1)} µs each`,
    whole.result <= MOST_LOG_LIKELIHOOD_GAP,
  );
  const scipy = scipyLikeliest(list);
  if (scipy === null) {
    lines.push('  scipy is not here: its row is left out');
    return;
  }
  const { differences, exactGradient } = scipy;
  const factor = (differences.secondsEach * 1e9) / whole.each;
  // What scipy finds is never above ours by more than what sums of so many counts can't show.
  const above = Math.max(differences.mostAbove, exactGradient.mostAbove);
  row(
    '  scipy BFGS, same counts',
    factor.toFixed(0),
    `times as costly, at least ${LEAST_BFGS_FACTOR}; its log L up to ${differences.mostBelow.toExponential(0)} below ours`,
    factor >= LEAST_BFGS_FACTOR && above <= MOST_LOG_LIKELIHOOD_GAP,
  );
  row(
    '  scipy BFGS given the exact gradient',
    ((exactGradient.secondsEach * 1e9) / whole.each).toFixed(0),
    `times as costly; its log L up to ${exactGradient.mostBelow.toExponential(0)} below ours`,
    true,
  );
  row(
    '  scipy BFGS against further counts of the same settings',
    ((differences.secondsEach * 1e9) / kernel.each).toFixed(0),
    `times as costly; ${(kernel.each / 1000).toFixed(1)} µs each`,
    true,
  );
}

twoPlates();
threePlates();
monteCarlo();
likeliestState();
process.stdout.write(`${lines.join('\n')}\n`);
if (missed > 0) process.exitCode = 1;
