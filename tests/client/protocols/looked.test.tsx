// @vitest-environment jsdom
import { cleanup, renderHook } from '@testing-library/react';
import { afterEach, describe, expect, it } from 'vitest';
import { DEFAULT_CONVENTION } from '../../../shared/optics/convention';
import { chooseSolution } from '../../../shared/protocol/choose-solutions';
import { benchProblem, solveRow } from '../../../shared/protocol/solve-row';
import type { Bench } from '../../../shared/schemas/benches';
import { viewOf } from '../../../src/features/protocols/designer/row-view';
import { useLooked } from '../../../src/features/protocols/designer/use-looked';
import {
  bench as anyBench,
  draft,
  idsFrom,
  plate as anyPlate,
  target as anyTarget,
} from '../../support/plates';

afterEach(cleanup);

const id = idsFrom('0193a000');
const plate = (last: number, retardanceDeg: number) =>
  anyPlate({ id: id(last), name: `P-${last}`, calibration: { retardanceDeg } });
const bench = (last: number, plates: Bench['plates']) =>
  anyBench({ id: id(last), name: `bench ${last}`, laserClass: '2', plates });

const two = bench(7, [plate(1, 179.2), plate(2, 88.9)]);
const three = bench(8, [plate(3, 89.8), plate(4, 179.6), plate(5, 92.3)]);
const target = anyTarget({ id: id(20), label: 't0', expression: 'bloch(70deg, 30deg)' });
const content = draft({ benchId: two.id, targets: [target] });

function solvedOn(solvedBench: Bench) {
  const read = benchProblem(solvedBench, DEFAULT_CONVENTION, content);
  if (!read.ok) throw new Error(read.error.message);
  const result = solveRow(target.expression, read.problem, DEFAULT_CONVENTION, null);
  if (result.status !== 'solved') throw new Error('the row can’t be read');
  const choice = chooseSolution({ solved: result.solved, heldFastAxesDeg: null });
  return viewOf(target, { result, choice, stale: false });
}

describe('the row that is looked at', () => {
  it('is nothing while its numbers are those of a bench with another number of plates', () => {
    const view = solvedOn(two);
    const { result, rerender } = renderHook(
      ({ now }: { now: Bench }) =>
        useLooked({ content, bench: now, convention: DEFAULT_CONVENTION, target, view }),
      { initialProps: { now: two } },
    );
    expect(result.current?.bench).toBe(two);
    rerender({ now: three });
    expect(result.current).toBeNull();
  });

  it('stays what it was, under its own label, while the row can’t be read', () => {
    const view = solvedOn(two);
    const unread = viewOf(
      { ...target, expression: 'linear(2' },
      {
        result: { status: 'unreadable', error: { column: 9, length: 1, message: 'Close the bracket.' } },
        choice: null,
        stale: false,
      },
    );
    const { result, rerender } = renderHook(
      ({ now }: { now: typeof view }) =>
        useLooked({ content, bench: two, convention: DEFAULT_CONVENTION, target, view: now }),
      { initialProps: { now: view } },
    );
    rerender({ now: unread });
    expect(result.current).toMatchObject({ target: { label: 't0' } });
  });
});
