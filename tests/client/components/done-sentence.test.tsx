import { act, cleanup, fireEvent, render, screen } from '@testing-library/react';
import { afterEach, beforeEach, expect, it, vi } from 'vitest';
import { LiveRegions } from '../../../src/components/LiveRegions';
import { UndoSentence } from '../../../src/components/UndoSentence';
import { sayDone } from '../../../src/components/live-region-store';

beforeEach(() => vi.useFakeTimers());
afterEach(() => {
  cleanup();
  act(() => sayDone(''));
  vi.useRealTimers();
});

const wait = (ms: number) => {
  act(() => {
    vi.advanceTimersByTime(ms);
  });
};

it('stands at the foot for ten seconds, in a region that was there before', () => {
  render(<LiveRegions />);
  const regions = screen.getAllByRole('status');
  act(() => sayDone('Q-B is seated.'));
  expect(regions.some((region) => region.contains(screen.getByText('Q-B is seated.')))).toBe(true);
  wait(9_900);
  expect(screen.queryByText('Q-B is seated.')).not.toBeNull();
  wait(200);
  expect(screen.queryByText('Q-B is seated.')).toBeNull();
});

it('is said again when the same is done again, and stands ten seconds from then', () => {
  render(<LiveRegions />);
  act(() => sayDone('Q-B is calibrated.'));
  const first = screen.getByText('Q-B is calibrated.');
  wait(9_000);
  act(() => sayDone('Q-B is calibrated.'));
  expect(screen.getByText('Q-B is calibrated.')).not.toBe(first);
  wait(9_000);
  expect(screen.queryByText('Q-B is calibrated.')).not.toBeNull();
});

it('is forgotten with its page', () => {
  const { unmount } = render(<LiveRegions />);
  act(() => sayDone('Q-B is seated.'));
  unmount();
  render(<LiveRegions />);
  expect(screen.queryByText('Q-B is seated.')).toBeNull();
});

it('stands beside the way back from something else', () => {
  render(
    <>
      <LiveRegions />
      <UndoSentence sentence="Row 4 taken out." onUndo={() => undefined} onGone={() => undefined} />
    </>,
  );
  act(() => sayDone('Q-B is seated.'));
  const foot = screen.getByText('Q-B is seated.').closest('[role="status"]');
  expect(foot?.contains(screen.getByRole('button', { name: 'Undo' }))).toBe(true);
});

it('stays as long as somebody is on it, and gives way to what is done next', () => {
  render(<LiveRegions />);
  act(() => sayDone('Q-B is seated.'));
  const foot = screen.getByText('Q-B is seated.').parentElement ?? document.body;
  fireEvent.pointerEnter(foot);
  wait(60_000);
  expect(screen.queryByText('Q-B is seated.')).not.toBeNull();
  act(() => sayDone('Q-B is calibrated.'));
  expect(screen.queryByText('Q-B is seated.')).toBeNull();
  fireEvent.pointerLeave(foot);
  wait(10_100);
  expect(screen.queryByText('Q-B is calibrated.')).toBeNull();
});
