/** A point of a line with the function's value there. */
export interface LinePoint {
  readonly at: number;
  readonly value: number;
}

// The golden section of an interval, from its smaller part: (3 − √5)/2.
const GOLDEN = 0.3819660112501051;

/**
 * The minimum of a function between `low` and `high`, from a point between them that is known, by parabolas through the three
 * best points with the golden section where they don't help (R. P. Brent, Algorithms for Minimization without Derivatives,
 * 1973, chapter 5). Values may be Infinity where the function isn't defined. Exact to about `tolerance`.
 */
export function lineMinimum(
  valueAt: (at: number) => number,
  start: LinePoint,
  [from, to]: readonly [number, number],
  tolerance: number,
): LinePoint {
  let [low, high] = [from, to];
  let [best, second, third] = [start, start, start];
  let [step, before] = [0, 0];
  for (let evaluations = 0; evaluations < 40; evaluations += 1) {
    const middle = (low + high) / 2;
    if (Math.abs(best.at - middle) <= 2 * tolerance - (high - low) / 2) break;
    const parabola = Math.abs(before) > tolerance ? parabolaStep(best, second, third) : null;
    const to1 = best.at + (parabola ?? 0);
    if (
      parabola !== null &&
      Math.abs(parabola) < Math.abs(before) / 2 &&
      to1 > low + tolerance &&
      to1 < high - tolerance
    ) {
      [before, step] = [step, parabola];
    } else {
      before = (best.at < middle ? high : low) - best.at;
      step = GOLDEN * before;
    }
    const at = best.at + (Math.abs(step) >= tolerance ? step : step > 0 ? tolerance : -tolerance);
    const value = valueAt(at);
    const tried = { at, value };
    if (value <= best.value) {
      if (at < best.at) high = best.at;
      else low = best.at;
      [third, second, best] = [second, best, tried];
    } else {
      if (at < best.at) low = at;
      else high = at;
      if (value <= second.value || second.at === best.at) [third, second] = [second, tried];
      else if (value <= third.value || third.at === best.at || third.at === second.at) third = tried;
    }
  }
  return best;
}

// From the best point to the summit of the parabola through all three; null where there is none.
function parabolaStep(best: LinePoint, second: LinePoint, third: LinePoint): number | null {
  const r = (best.at - second.at) * (best.value - third.value);
  const q = (best.at - third.at) * (best.value - second.value);
  const bend = 2 * (q - r);
  const step = -((best.at - third.at) * q - (best.at - second.at) * r) / bend;
  return step > -Infinity && step < Infinity ? step : null;
}
