import { afterEach, beforeEach, describe, expect, it, vi } from 'vitest';
import { DEFAULT_CONVENTION } from '../../../shared/optics/convention';
import type { SolverAnswer, SolverJob } from '../../../src/workers/solver-messages';
import { solvingBench, solvingPlate, solvingTask } from '../../support/plates';

/** Its mount stops, and its play leaves it less than half a turn. */
const stiff = solvingPlate({
  mount: { rangeDeg: { from: 0, to: 180 }, backlashDeg: 175, approach: 'rising' },
});
const ring = solvingPlate({ mount: { approach: 'rising' } });
const bench = solvingBench({
  plates: [ring, solvingPlate({ mount: { approach: 'rising' }, calibration: { retardanceDeg: 88.9 } })],
});

const answers: SolverAnswer[] = [];
beforeEach(async () => {
  answers.length = 0;
  vi.stubGlobal('postMessage', (answer: SolverAnswer) => answers.push(answer));
  await import('../../../src/workers/solver.worker');
});
afterEach(() => {
  vi.unstubAllGlobals();
});

let job = 0;
async function ask(change: Partial<SolverJob>): Promise<readonly SolverAnswer[]> {
  job += 1;
  const data: SolverJob = {
    job,
    bench,
    convention: DEFAULT_CONVENTION,
    task: solvingTask({ objective: 'least-travel' }),
    rows: ['D', 'nonsense', 'bloch(70deg, 20deg)'].map((expression) => ({
      expression,
      heldFastAxesDeg: null,
      wanted: true,
    })),
    ...change,
  };
  self.dispatchEvent(new MessageEvent('message', { data }));
  const ofIt = () => answers.filter((answer) => answer.job === data.job);
  await vi.waitFor(() => expect(ofIt().some((one) => one.kind !== 'rows' || one.done)).toBe(true), 5000);
  return ofIt();
}

describe('the solver beside the page', () => {
  it('is done with the least travel when its choices are sent, not before', async () => {
    const [rows, choices, ...more] = await ask({});
    expect(rows).toMatchObject({ kind: 'rows', doneCount: 3, done: false });
    expect(choices).toMatchObject({ kind: 'choices', job, unplanned: null });
    expect(more).toEqual([]);
  });

  it('sends why there is no plan, by the place among the rows that were sent', async () => {
    const narrow = { ...bench, plates: [ring, stiff] };
    const sent = await ask({ bench: narrow });
    expect(sent.at(-1)).toMatchObject({ kind: 'choices', unplanned: { plate: 1 } });
    const readableFirst = await ask({
      bench: narrow,
      rows: [
        { expression: 'nonsense', heldFastAxesDeg: null, wanted: true },
        { expression: 'D', heldFastAxesDeg: null, wanted: true },
      ],
    });
    expect(readableFirst.at(-1)).toMatchObject({ kind: 'choices', unplanned: { row: 1, plate: 1 } });
  });

  it('answers what it was not made for with a sentence, instead of nothing', async () => {
    const sent = await ask({ bench: { ...bench, plates: [] } });
    expect(sent.at(-1)).toMatchObject({ kind: 'failed', job });
    const [last] = sent.slice(-1);
    expect(last?.kind === 'failed' && last.sentence).toMatch(/^The solver stopped at these rows\./);
  });
});
