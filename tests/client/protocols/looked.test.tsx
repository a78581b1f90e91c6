// @vitest-environment jsdom
import { cleanup, renderHook } from '@testing-library/react';
import { afterEach, describe, expect, it } from 'vitest';
import { DEFAULT_CONVENTION } from '../../../shared/optics/convention';
import { chooseSolution } from '../../../shared/protocol/choose-solutions';
import { benchProblem, solveRow } from '../../../shared/protocol/solve-row';
import type { Bench } from '../../../shared/schemas/benches';
import type { DraftContent } from '../../../shared/schemas/protocols';
import { viewOf } from '../../../src/features/protocols/designer/row-view';
import { useLooked } from '../../../src/features/protocols/designer/use-looked';
import { plateFixture } from '../cabinet/plate-fixture';

afterEach(cleanup);

const id = (last: number) => `0193a000-0000-7000-8000-${String(last).padStart(12, '0')}`;
const plate = (last: number, retardanceDeg: number) => {
  const fixture = plateFixture({ id: id(last), name: `P-${last}` });
  return { ...fixture, calibration: { ...fixture.calibration, retardanceDeg } };
};

function bench(last: number, plates: Bench['plates']): Bench {
  return {
    id: id(last),
    name: `bench ${last}`,
    wavelengthNm: 810,
    wavelengthSigmaNm: 0,
    temperatureC: null,
    temperatureSigmaK: 0,
    inputExpression: 'H',
    polariserSigmaDeg: 0.05,
    polariserExtinction: null,
    laserClass: '2',
    hazardWavelengthsNm: [810],
    plates,
    retiredAt: null,
    revision: 1,
  };
}

const two = bench(7, [plate(1, 179.2), plate(2, 88.9)]);
const three = bench(8, [plate(3, 89.8), plate(4, 179.6), plate(5, 92.3)]);
const target = { id: id(20), label: 't0', expression: 'bloch(70deg, 30deg)', heldFastAxesDeg: null };
const content: DraftContent = {
  name: 'A protocol',
  purpose: '',
  kind: 'prepare',
  benchId: two.id,
  objective: 'least-expected-infidelity',
  presentDialsDeg: null,
  toleranceInfidelity: 1e-3,
  targets: [target],
};

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
