import { cheapestWay, finish } from './cheapest-way';
import { exactOrder, isExactOrderFeasible } from './exact-order';
import { improvedOrder } from './improve-order';
import { leastCosts, lowerBound } from './order-bound';
import { planOf, type SequencePlan } from './plan';
import type { SequenceProblem } from './problem';
import { type Course, courseOf } from './stations';

export interface OrderOptions {
  /** Lists of up to this many targets get the best order of all (12 at most), longer ones a good one with its bound. */
  readonly exactUpTo: number;
}

/** How far the search for an order has come. */
export interface OrderProgress {
  readonly phase: 'exact' | 'search';
  /** 0 to 1. */
  readonly share: number;
}

/** Another order of the targets, beside the present one. */
export interface OrderPlan {
  /** The target (index in the problem) to come first, second, … The present order when no other is cheaper. */
  readonly order: readonly number[];
  /** The cheapest way in that order: entry k belongs to target `order[k]`. */
  readonly plan: SequencePlan;
  /** The cheapest way in the present order. */
  readonly present: SequencePlan;
  /** What the order saves against the cheapest way in the present one. */
  readonly savedDeg: number;
  readonly savedSeconds: number | null;
  readonly method: 'exact' | 'heuristic';
  /** No order costs less than this, in the unit of the problem's cost; the other is null. Exact: the cost itself. */
  readonly boundDeg: number | null;
  readonly boundSeconds: number | null;
}

const IMPROVES = 1e-9;
const MOST_EXACT = 12;

/**
 * A cheaper order of the targets, if there is one, with a bound on how much cheaper any order could be.
 * @throws as `planSequence`.
 */
export function planOrder(problem: SequenceProblem, options: OrderOptions = { exactUpTo: 9 }): OrderPlan {
  return finish(planOrderSteps(problem, options));
}

/** `planOrder` in small steps, for a worker that reports progress and can be stopped between them. */
export function* planOrderSteps(
  problem: SequenceProblem,
  { exactUpTo }: OrderOptions = { exactUpTo: 9 },
): Generator<OrderProgress, OrderPlan> {
  const course = courseOf(problem);
  const presentOrder = course.rows.map((_, k) => k);
  const presentWay = finish(cheapestWay(course, presentOrder));
  const isExact = course.rows.length <= Math.min(exactUpTo, MOST_EXACT) && isExactOrderFeasible(course);
  const least = isExact ? [] : leastCosts(course.cost, course.rows, course.start);
  const search = isExact ? exactOrder(course) : improvedOrder(course, least);
  let step = search.next();
  while (step.done !== true) {
    yield { phase: isExact ? 'exact' : 'search', share: step.value };
    step = search.next();
  }
  const foundWay = finish(cheapestWay(course, step.value));
  const isBetter = foundWay.cost < presentWay.cost - IMPROVES;
  const order = isBetter ? step.value : presentOrder;
  const way = isBetter ? foundWay : presentWay;
  const bound = isExact ? way.cost : Math.min(way.cost, lowerBound(least, course.start !== null));
  const plan = planOf(reordered(course, order), way.stations);
  const present = planOf(course, presentWay.stations);
  const isTime = problem.cost === 'time';
  return {
    order,
    plan,
    present,
    savedDeg: present.travelDeg - plan.travelDeg,
    savedSeconds: present.seconds === null || plan.seconds === null ? null : present.seconds - plan.seconds,
    method: isExact ? 'exact' : 'heuristic',
    boundDeg: isTime ? null : bound,
    boundSeconds: isTime ? bound : null,
  };
}

function reordered(course: Course, order: readonly number[]): Course {
  const { problem, rows, first } = course;
  return {
    ...course,
    problem: { ...problem, rows: order.flatMap((k) => problem.rows[k] ?? []) },
    rows: order.flatMap((k) => rows[k] ?? []),
    first: order.flatMap((k) => first[k] ?? []),
  };
}
