// @vitest-environment jsdom
import { beforeEach, describe, expect, test } from 'vitest';
import { createBenchStore } from '../../../src/features/runs/bench-store';
import { benchKeeping, emptyEntry, type WaitingReading } from '../../../src/features/runs/kept-entry';

const runId = '0197c3a0-0000-7000-8000-000000000231';
const open = () => createBenchStore(benchKeeping('ines', runId), 2);
const reading = (key: string, settingIndex: number): WaitingReading => ({
  key,
  body: { outcome: 'done', settingIndex, dialledDeg: [83.5, 187], note: '' },
  typedAt: `2026-01-05T09:0${settingIndex}:00.000Z`,
});

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
    store.getState().record(reading('k1', 8), 9, null);
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

  test('two tabs of one person never write over each other’s readings', () => {
    const [one, other] = [open(), open()];
    one.getState().record(reading('k1', 1), 2, null);
    other.getState().record(reading('k3', 3), 4, null);
    one.getState().record(reading('k2', 2), 3, null);
    const keys = () =>
      open()
        .getState()
        .waiting.map(({ key }) => key);
    expect(keys()).toEqual(['k1', 'k2', 'k3']);
    one.getState().acknowledged('k1');
    expect(keys()).toEqual(['k2', 'k3']);
  });

  test('nothing of a run is left once it is forgotten, and other runs keep theirs', () => {
    open().getState().record(reading('k1', 1), 2, null);
    const elsewhere = createBenchStore(benchKeeping('ines', 'another run'), 2);
    elsewhere.getState().confirm(0, 4);
    benchKeeping('ines', runId).forget();
    expect(benchKeeping('ines', runId).entry()).toEqual(emptyEntry);
    expect(benchKeeping('ines', 'another run').entry().confirmedDeg).toEqual([4, null]);
  });

  test('belongs to the person: somebody else on the same tablet finds nothing', () => {
    open().getState().confirm(0, 83.5);
    expect(benchKeeping('jonas', runId).entry()).toEqual(emptyEntry);
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
    const store = createBenchStore({ ...benchKeeping('ines', runId), keepCursor: () => false }, 2);
    store.getState().confirm(0, 1);
    expect(store.getState().kept).toBe(false);
  });
});
