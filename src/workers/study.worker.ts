import { startMonteCarlo } from '../../shared/optics/monte-carlo';
import { planOrderSteps, planSequenceSteps } from '../../shared/optics/sequence';
import { reachRows, type ReachMap, type ReachRow } from '../../shared/optics/solver/reach-map';
import { degrees, toRadians } from '../../shared/optics/units';
import { robustStudy } from './robust-study';
import type { StudyAnswer, StudyRequest, StudyResult } from './study-messages';

/** Told no more often than an eye can follow. */
const tellEveryMs = 100;

function answer(message: StudyAnswer): void {
  self.postMessage(message);
}

/** Runs to the end, telling the share of it that is done. */
function runThrough<Step, Result>(
  steps: Generator<Step, Result>,
  shareOf: (step: Step) => number,
  from = 0,
  to = 1,
): Result {
  let told = 0;
  for (;;) {
    const step = steps.next();
    if (step.done === true) return step.value;
    const now = performance.now();
    if (now - told > tellEveryMs) {
      told = now;
      answer({ state: 'working', share: from + (to - from) * shareOf(step.value) });
    }
  }
}

type Request<Kind extends StudyRequest['kind']> = Extract<StudyRequest, { readonly kind: Kind }>;

/** Few enough that a told share is never long out of date. */
const drawsAtOnce = 5000;

function* drawing({ problem, draws, seed, toleranceInfidelity }: Request<'monte-carlo'>) {
  const run = startMonteCarlo(problem, seed);
  while (run.draws < draws) {
    run.advance(Math.min(drawsAtOnce, draws - run.draws));
    yield run.draws / draws;
  }
  const summary = run.summary();
  if (summary === null) throw new RangeError('Ask for at least one draw.');
  return { summary, shareWithin: run.countWithin(toleranceInfidelity) / run.draws };
}

function* mapping({ input, retardancesDeg, stepDeg }: Request<'reach'>): Generator<number, ReachMap> {
  const [first, second] = retardancesDeg;
  const steps = reachRows(input, [toRadians(degrees(first)), toRadians(degrees(second))], stepDeg);
  const rows: ReachRow[] = [];
  for (;;) {
    const step = steps.next();
    if (step.done === true) return { rows, totals: step.value };
    rows.push(step.value);
    yield (rows.length * stepDeg) / 180;
  }
}

function study(request: StudyRequest): StudyResult {
  switch (request.kind) {
    case 'sequence': {
      const { problem, reorder } = request;
      const planned = reorder ? 0.2 : 1;
      const plan = runThrough(
        planSequenceSteps(problem),
        ({ rowsDone, rows }) => rowsDone / rows,
        0,
        planned,
      );
      const order = reorder ? runThrough(planOrderSteps(problem), ({ share }) => share, planned) : null;
      return { kind: 'sequence', plan, order };
    }
    case 'monte-carlo':
      return { kind: 'monte-carlo', ...runThrough(drawing(request), (share) => share) };
    case 'reach':
      return { kind: 'reach', map: runThrough(mapping(request), (share) => share), stepDeg: request.stepDeg };
    case 'robust':
      return { kind: 'robust', study: runThrough(robustStudy(request.question), (share) => share) };
  }
}

self.addEventListener('message', ({ data }: MessageEvent<StudyRequest>) => {
  try {
    answer({ state: 'working', share: 0 });
    answer({ state: 'done', result: study(data) });
  } catch (error) {
    answer({
      state: 'failed',
      sentence: error instanceof Error ? error.message : 'The calculation stopped.',
    });
  }
});
