import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import type { DraftContent } from '../../../shared/schemas/protocols';
import {
  addTarget,
  type DraftEdit,
  moveTarget,
  newTarget,
  newTargets,
  removeTarget,
  rename,
  takeHeld,
  takeOrder,
  writeExpression,
  writeLabel,
} from '../../../src/features/protocols/draft-edits';
import { applyEdit, redo, startHistory, undo } from '../../../src/features/protocols/draft-history';

const ids = ['0193a000-0000-7000-8000-000000000001', '0193a000-0000-7000-8000-000000000002'] as const;
const [firstId, secondId] = ids;

const draft: DraftContent = {
  name: 'Compass points',
  purpose: '',
  benchId: '0193a000-0000-7000-8000-0000000000b0',
  kind: 'prepare',
  objective: 'least-expected-infidelity',
  presentDialsDeg: null,
  toleranceInfidelity: 1e-3,
  targets: [
    { id: firstId, label: 't0', expression: 'H', heldFastAxesDeg: null },
    { id: secondId, label: 't1', expression: 'D', heldFastAxesDeg: [10, 20] },
  ],
};

const anyEdit: fc.Arbitrary<DraftEdit> = fc.oneof(
  fc.tuple(fc.constantFrom(...ids), fc.string()).map(([id, text]) => writeExpression(id, text)),
  fc.tuple(fc.constantFrom(...ids), fc.string()).map(([id, text]) => writeLabel(id, text)),
  fc.constantFrom(...ids).map(removeTarget),
  fc.tuple(fc.constantFrom(...ids), fc.integer({ min: -3, max: 3 })).map(([id, by]) => moveTarget(id, by)),
  fc.string().map(rename),
  fc.string().map((expression) => addTarget(newTarget([], expression))),
);

describe('a draft under edit', () => {
  it('comes back to where it began when every edit is undone', () => {
    fc.assert(
      fc.property(fc.array(anyEdit, { maxLength: 30 }), (edits) => {
        let history = edits.reduce(applyEdit, startHistory(draft));
        for (let count = 0; count <= edits.length; count += 1) history = undo(history);
        expect(history.content).toEqual(draft);
      }),
    );
  });

  it('stands again as it stood when what was undone is done again', () => {
    fc.assert(
      fc.property(fc.array(anyEdit, { maxLength: 30 }), fc.nat({ max: 30 }), (edits, steps) => {
        const edited = edits.reduce(applyEdit, startHistory(draft));
        let history = edited;
        for (let count = 0; count < steps; count += 1) history = undo(history);
        for (let count = 0; count < steps; count += 1) history = redo(history);
        expect(history.content).toEqual(edited.content);
      }),
    );
  });

  it('undoes a word typed into one field as one, and no further', () => {
    const named = applyEdit(startHistory(draft), rename('Compass'));
    const typed = ['V', 'V +', 'V + H']
      .map((text) => writeExpression(firstId, text))
      .reduce(applyEdit, named);
    expect(undo(typed).content).toEqual(named.content);
  });

  it('lets go of a held solution when its state is written anew', () => {
    const { content } = applyEdit(startHistory(draft), writeExpression(secondId, 'A'));
    expect(content.targets[1]?.heldFastAxesDeg).toBeNull();
  });

  it('moves a row no further than the table goes', () => {
    const { content } = applyEdit(startHistory(draft), moveTarget(firstId, 99));
    expect(content.targets.map(({ id }) => id)).toEqual([secondId, firstId]);
  });

  it('gives a new row the first label that is free', () => {
    expect(newTarget(draft.targets, '').label).toBe('t2');
  });
});

describe('a plan that is taken', () => {
  it('puts the rows in its order and ranks them by the travel it was planned for, undone as one', () => {
    const taken = applyEdit(startHistory(draft), takeOrder([secondId, firstId]));
    expect(taken.content.targets.map(({ id }) => id)).toEqual([secondId, firstId]);
    expect(taken.content.objective).toBe('least-travel');
    expect(undo(taken).content).toEqual(draft);
  });

  it('by time holds the solution of each row that it chose', () => {
    const taken = applyEdit(
      startHistory(draft),
      takeHeld([
        { id: secondId, fastAxesDeg: [1, 2] },
        { id: firstId, fastAxesDeg: [3, 4] },
      ]),
    );
    expect(taken.content.targets.map(({ id, heldFastAxesDeg }) => [id, heldFastAxesDeg])).toEqual([
      [secondId, [1, 2]],
      [firstId, [3, 4]],
    ]);
    expect(taken.content.objective).toBe('least-expected-infidelity');
    expect(undo(taken).content).toEqual(draft);
  });
});

describe('rows that come many at once', () => {
  it('keep their labels where these are free, and get free ones where they are empty or taken', () => {
    const rows = newTargets(draft.targets, [
      { label: 'a', expression: 'H' },
      { label: 't1', expression: 'V' },
      { label: '', expression: 'D' },
      { label: 'a', expression: 'A' },
    ]);
    expect(rows.map(({ label }) => label)).toEqual(['a', 't2', 't3', 't4']);
  });
});
