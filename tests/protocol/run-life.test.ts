import fc from 'fast-check';
import { expect, test } from 'vitest';
import { type RunEvent, type RunState, transition } from '../../shared/protocol/run-life';

const events: fc.Arbitrary<RunEvent> = fc.oneof(
  fc.constantFrom<RunEvent>({ kind: 'record' }, { kind: 'pause' }, { kind: 'resume' }),
  fc.nat({ max: 2 }).map((open): RunEvent => ({ kind: 'finish', open })),
);

/** The life of a run as a table, written beside the product's function and not from it. */
const allowed: Readonly<Record<RunState, Readonly<Partial<Record<RunEvent['kind'], RunState>>>>> = {
  running: { record: 'running', pause: 'paused', finish: 'finished' },
  paused: { resume: 'running', finish: 'finished' },
  finished: {},
};

test('in five thousand random lives a run goes only where it may, and a finished one nowhere', () => {
  fc.assert(
    fc.property(fc.array(events, { maxLength: 30 }), (life) => {
      let state: RunState = 'running';
      for (const event of life) {
        const next = transition(state, event);
        const open = event.kind === 'finish' ? event.open : 0;
        const expected = open > 0 ? undefined : allowed[state][event.kind];
        expect(next.ok ? next.state : undefined).toBe(expected);
        if (next.ok) state = next.state;
        else expect(next.reason).toMatch(/\.$/);
      }
    }),
    { numRuns: 5000 },
  );
});
