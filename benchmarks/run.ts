import { radians } from '../shared/optics/units';
import { forward, multiStart, problems, solveAll } from './two-plates';

/*
 * Costs as ratios within one run on one core: seconds say more about the machine than about the code.
 * The limit of 250 forward evaluations is the brief's.
 */

const LIMIT = 250;
const COUNT = 2000;
const ROUNDS = 9;

/** Least time of several rounds, in nanoseconds for each of `count` pieces of work. */
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

const list = problems(COUNT);
const angles = Array.from({ length: 64 }, (_, k) => radians((k * Math.PI) / 64));
const evaluation = nanoseconds(COUNT * angles.length, () => {
  let sum = 0;
  for (const problem of list)
    for (const angle of angles) sum += forward(problem, angle, radians(angle + 0.3))[2];
  return sum;
});
const solving = nanoseconds(COUNT, () => solveAll(list));
const few = list.slice(0, 40);
const starts = 60;
const searching = nanoseconds(few.length, () =>
  few.reduce((sum, problem) => sum + multiStart(problem, starts), 0),
);

const ratio = solving.each / evaluation.each;
const lines = [
  `one forward evaluation of two plates      ${evaluation.each.toFixed(0)} ns`,
  `two-plate preparation, all solutions      ${solving.each.toFixed(0)} ns, ${(solving.result / COUNT).toFixed(2)} settings on average`,
  `  as forward evaluations                  ${ratio.toFixed(0)} (at most ${LIMIT})`,
  `least squares from ${starts} starts            ${(searching.result / few.length).toFixed(2)} settings on average where the solver finds ${(solveAll(few) / few.length).toFixed(2)}`,
  `  as preparations                         ${(searching.each / solving.each).toFixed(0)}`,
];
process.stdout.write(`${lines.join('\n')}\n`);
if (ratio > LIMIT) process.exitCode = 1;
