// @vitest-environment jsdom
import { beforeEach, describe, expect, test } from 'vitest';
import { createBenchStore } from '../../../src/features/runs/bench-store';
import { emptyEntry, keepEntry, keptEntry } from '../../../src/features/runs/kept-entry';

const runId = '0197c3a0-0000-7000-8000-000000000231';
const open = () => createBenchStore(keptEntry('ines', runId), 2, (entry) => keepEntry('ines', runId, entry));

beforeEach(() => {
  localStorage.clear();
});

describe('what was confirmed and not yet recorded', () => {
  test('survives a reload, with the note and the readings that wait', () => {
    const before = open();
    before.getState().openSetting(8, { turnedSince: null });
    before.getState().confirm(0, 83.5);
    before.getState().setNote('fan on');
    const after = open().getState();
    expect(after.setting).toBe(8);
    expect(after.confirmedDeg).toEqual([83.5, null]);
    expect(after.note).toBe('fan on');
  });

  test('a reading stays in the queue, with its key, until the server has acknowledged it', () => {
    const store = open();
    store.getState().record(
      {
        key: 'k1',
        body: { outcome: 'done', settingIndex: 8, dialledDeg: [83.5, 187], note: '' },
        typedAt: '2026-01-05T09:00:00Z',
      },
      9,
      null,
    );
    expect(
      open()
        .getState()
        .waiting.map(({ key }) => key),
    ).toEqual(['k1']);
    expect(open().getState().setting).toBe(9);
    expect(open().getState().confirmedDeg).toEqual([null, null]);
    open().getState().acknowledged('k1');
    expect(open().getState().waiting).toEqual([]);
  });

  test('belongs to the person: somebody else on the same tablet finds nothing', () => {
    open().getState().confirm(0, 83.5);
    expect(keptEntry('jonas', runId)).toEqual(emptyEntry);
  });

  test('a broken entry is an empty one', () => {
    localStorage.setItem(`quarterturn.bench.ines.${runId}`, '{"setting":');
    expect(open().getState().confirmedDeg).toEqual([null, null]);
    localStorage.setItem(`quarterturn.bench.ines.${runId}`, '{"setting":"nine"}');
    expect(open().getState().setting).toBeNull();
  });

  test('back takes the last confirmed plate back, then says that there is none', () => {
    const store = open();
    store.getState().confirm(0, 83.5);
    store.getState().confirm(1, 187);
    expect(store.getState().takeBack()).toBe(true);
    expect(store.getState().confirmedDeg).toEqual([83.5, null]);
    expect(store.getState().takeBack()).toBe(true);
    expect(store.getState().takeBack()).toBe(false);
  });

  test('says so where the browser keeps nothing', () => {
    const store = createBenchStore(emptyEntry, 2, () => false);
    store.getState().confirm(0, 1);
    expect(store.getState().kept).toBe(false);
  });
});
