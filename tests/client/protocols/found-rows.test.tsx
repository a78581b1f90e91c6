// @vitest-environment jsdom
import { act, cleanup, renderHook } from '@testing-library/react';
import { afterEach, beforeEach, describe, expect, it, vi } from 'vitest';
import { DEFAULT_CONVENTION } from '../../../shared/optics';
import { firstChoice } from '../../../src/features/protocols/rows/target-set-choice';
import { type RowsFrom, useFoundRows } from '../../../src/features/protocols/rows/use-found-rows';

beforeEach(() => {
  vi.useFakeTimers();
});
afterEach(() => {
  cleanup();
  vi.useRealTimers();
});

interface Given {
  readonly from: RowsFrom;
  readonly text: string;
}

const choice = firstChoice('prepare');

function found(first: Given) {
  return renderHook(
    ({ from, text }: Given) => useFoundRows(from, choice, text, 'prepare', DEFAULT_CONVENTION),
    {
      initialProps: first,
    },
  );
}

const pass = (ms: number) => {
  act(() => {
    vi.advanceTimersByTime(ms);
  });
};

const long = (rows: string) => `# ${'x'.repeat(120_000)}\n${rows}`;

describe('rows found in a text', () => {
  it('are read once, with a point for each that can be read', () => {
    const { result } = found({ from: 'text', text: 'a,H\nb,what\nc,V' });
    expect(result.current.rows.map(({ label }) => label)).toEqual(['a', 'b', 'c']);
    expect(result.current.points).toEqual([
      { label: 'a', state: [1, 0, 0] },
      { label: 'c', state: [-1, 0, 0] },
    ]);
    expect(result.current.problems).toHaveLength(1);
  });

  it('of a long text are those of an older one until it stops changing, and say so', () => {
    const { result, rerender } = found({ from: 'text', text: 'a,H' });
    expect(result.current.isBehind).toBe(false);
    rerender({ from: 'text', text: long('b,V') });
    pass(200);
    rerender({ from: 'text', text: long('b,V\nc,D') });
    pass(200);
    expect(result.current.isBehind).toBe(true);
    pass(200);
    expect(result.current.isBehind).toBe(false);
    expect(result.current.rows.map(({ label }) => label)).toEqual(['b', 'c']);
  });

  it('hold nothing up while a set is chosen', () => {
    const { result, rerender } = found({ from: 'set', text: '' });
    const { points } = result.current;
    rerender({ from: 'set', text: long('b,V') });
    expect(result.current.isBehind).toBe(false);
    expect(result.current.points).toBe(points);
  });
});
