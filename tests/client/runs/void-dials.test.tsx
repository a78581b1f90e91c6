// @vitest-environment jsdom
import { cleanup, screen, waitFor } from '@testing-library/react';
import { afterEach, beforeEach, expect, test, vi } from 'vitest';
import type { VoidDials } from '../../../shared/schemas/reliance';
import { FakeApi, openBench } from './bench-harness';
import { id, makeRun, makeVersion } from './fixture';

const version = makeVersion();
const left: VoidDials = { why: 'seat-ended', plateId: id(31), plateName: 'H-3' };
const turned: VoidDials = { why: 'numbers-turned', plateId: id(32), plateName: 'Q-B' };
const button = (name: string | RegExp) => screen.findByRole('button', { name });
const apiWith = (...voids: VoidDials[]) => new FakeApi({ ...makeRun(version), voids }, version);

beforeEach(() => localStorage.clear());
afterEach(() => {
  cleanup();
  vi.unstubAllGlobals();
});

test('nothing is confirmed once a plate left its seat, before somebody says that this is known', async () => {
  const api = apiWith(left);
  const { user } = openBench(api);
  expect((await screen.findByRole('alert')).textContent).toBe(
    'Its dials are void: H-3 left the seat that they were solved for.',
  );
  expect(screen.queryByRole('button', { name: /^H-3 says/u })).toBeNull();
  await user.click(await button('Go on with void dials'));
  expect(await button(/^H-3 says/u)).toBeTruthy();
  cleanup();
  // This device knows it now, and is asked again only of something else.
  openBench(api);
  expect(await button(/^H-3 says/u)).toBeTruthy();
  cleanup();
  openBench(apiWith(left, turned));
  expect((await screen.findByRole('alert')).textContent).toBe(
    'Its dials are void: the numbers around Q-B rise the other way now.',
  );
});

test('a run is paused from there, with what became void as its note', async () => {
  const api = apiWith(left);
  const { user } = openBench(api);
  await user.click(await button('Pause the run'));
  await waitFor(() => expect(api.run.summary.state).toBe('paused'));
  expect(api.run.summary.pauseNote).toContain('H-3 left the seat');
});

test('a run that is only read says nothing of it', async () => {
  openBench(apiWith(left), { role: 'guest' });
  expect(await screen.findByText(/nothing can be recorded/u)).toBeTruthy();
  expect(screen.queryByRole('button', { name: 'Go on with void dials' })).toBeNull();
});
