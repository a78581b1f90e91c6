// @vitest-environment jsdom
import { act, cleanup, renderHook } from '@testing-library/react';
import { afterEach, describe, expect, it } from 'vitest';
import type { DraftContent } from '../../../shared/schemas/protocols';
import { removeTarget, rename, takeOrder } from '../../../src/features/protocols/draft-edits';
import { useUndoSentence } from '../../../src/features/protocols/designer/use-undo-sentence';
import { draft, target } from '../../support/plates';

afterEach(cleanup);

const start = draft({
  targets: [
    target({ id: 'a', label: 't0' }),
    target({ id: 'b', label: 't1' }),
    target({ id: 'c', label: 't2' }),
  ],
});

function page() {
  const hook = renderHook((content: DraftContent) => useUndoSentence(content), { initialProps: start });
  return { show: (content: DraftContent) => hook.rerender(content), now: () => hook.result.current };
}

describe('the sentence at the foot', () => {
  it('names the row that was taken out, and goes with the next edit', () => {
    const { show, now } = page();
    const without = removeTarget('b').apply(start);
    show(without);
    expect(now().done).toBe('Row 2, t1, taken out.');
    show(rename('another').apply(without));
    expect(now().done).toBeNull();
  });

  it('says what it is told of the edit that comes with it, and of no other', () => {
    const { show, now } = page();
    act(() => now().say('The rows stand in the planned order, ranked by least travel.'));
    const ordered = takeOrder(['c', 'a', 'b']).apply(start);
    show(ordered);
    expect(now().done).toBe('The rows stand in the planned order, ranked by least travel.');
    show(start);
    expect(now().done).toBeNull();
  });
});
