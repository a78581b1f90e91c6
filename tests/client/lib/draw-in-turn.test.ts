import { afterEach, beforeEach, expect, test, vi } from 'vitest';
import { drawAlone, drawInTurn } from '../../../src/lib/draw-in-turn';

beforeEach(() => {
  vi.useFakeTimers({ toFake: ['setTimeout', 'requestAnimationFrame', 'performance'] });
});
afterEach(() => {
  vi.useRealTimers();
});

/** Longer than a frame and the task behind it. */
const frameMs = 17;

test('small pieces share a frame in their order; what is enough for one has its own', () => {
  const drawn: string[] = [];
  drawInTurn(() => drawn.push('a'));
  drawInTurn(() => drawn.push('b'));
  drawAlone(() => drawn.push('alone'));
  drawInTurn(() => drawn.push('c'));
  expect(drawn).toEqual([]);
  vi.advanceTimersByTime(frameMs);
  expect(drawn).toEqual(['a', 'b']);
  vi.advanceTimersByTime(frameMs);
  expect(drawn).toEqual(['a', 'b', 'alone']);
  vi.advanceTimersByTime(frameMs);
  expect(drawn).toEqual(['a', 'b', 'alone', 'c']);
});

test('a piece that takes the slice leaves the others to the next frame', () => {
  const drawn: string[] = [];
  drawInTurn(() => {
    drawn.push('long');
    vi.advanceTimersByTime(6);
  });
  drawInTurn(() => drawn.push('next'));
  vi.advanceTimersToNextTimer().advanceTimersToNextTimer();
  expect(drawn).toEqual(['long']);
  vi.runAllTimers();
  expect(drawn).toEqual(['long', 'next']);
});

test('what was taken back is not drawn', () => {
  const drawn: string[] = [];
  const takeBack = drawInTurn(() => drawn.push('gone'));
  drawInTurn(() => drawn.push('stays'));
  takeBack();
  vi.runAllTimers();
  expect(drawn).toEqual(['stays']);
});

test('those behind a piece that throws are drawn all the same', () => {
  const drawn: string[] = [];
  drawInTurn(() => {
    throw new Error('this piece can not be drawn');
  });
  drawInTurn(() => drawn.push('next'));
  expect(() => vi.runAllTimers()).toThrow('this piece can not be drawn');
  vi.runAllTimers();
  expect(drawn).toEqual(['next']);
});
