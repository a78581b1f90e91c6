// @vitest-environment jsdom
import { cleanup, screen, waitFor } from '@testing-library/react';
import { afterEach, beforeEach, describe, expect, test, vi } from 'vitest';
import { madeOf, wantedDials } from '../../../src/features/runs/dial-cost';
import { FakeApi, openBench } from './bench-harness';
import { id, makeRun, makeVersion } from './fixture';
import { infidelityAscii } from '../../../src/lib/format/fidelity';
import type { Run } from '../../../shared/schemas/runs';

const version = makeVersion();
const dials = version.content.targets.map((_, index) => wantedDials(version.content, index));
const said = (setting: number, plate: number): string => (dials[setting]?.[plate] ?? NaN).toFixed(1);
const button = (name: string | RegExp) => screen.findByRole('button', { name });
/** Longer than the bench takes two presses for one. */
const handMoves = () => new Promise((resolve) => setTimeout(resolve, 380));

beforeEach(() => {
  localStorage.clear();
  // jsdom has no modal dialogs.
  HTMLDialogElement.prototype.showModal = function showModal() {
    this.open = true;
  };
  HTMLDialogElement.prototype.close = function close() {
    this.open = false;
  };
});
afterEach(() => {
  cleanup();
  vi.unstubAllGlobals();
});

/** Confirms every plate of the open setting as wanted. */
async function confirmAll(user: ReturnType<typeof openBench>['user'], setting: number): Promise<void> {
  for (const [plate, name] of ['H-3', 'Q-B'].entries()) {
    await user.click(await button(`${name} says ${said(setting, plate)}`));
    await handMoves();
  }
}

describe('the bench', () => {
  test('asks for one plate after the other, says the way, and records what was dialled', async () => {
    const api = new FakeApi(makeRun(version), version);
    const { user } = openBench(api);
    await button(`H-3 says ${said(0, 0)}`);
    expect(screen.queryByText(/nothing can be recorded/u)).toBeNull();
    expect(screen.getByText(/^H-3, turn (?:counter-)?clockwise by [\d.]+° to [\d.]+$/u)).toBeTruthy();
    await user.click(await button(/^H-3 says/u));
    await handMoves();
    expect(screen.getByText(`dialled ${said(0, 0)}`)).toBeTruthy();
    await user.click(await button(`Q-B says ${said(0, 1)}`));
    await handMoves();
    await user.click(await button('Record and go to 2'));
    await button(`H-3 says ${said(1, 0)}`);
    await waitFor(() => expect(api.run.readings).toHaveLength(1));
    expect(api.posts('/readings')[0]?.body).toEqual({
      outcome: 'done',
      settingIndex: 0,
      dialledDeg: dials[0],
      note: '',
    });
    // The next way starts from what was dialled last.
    expect(screen.getByText(new RegExp(`from ${said(0, 0)} `, 'u'))).toBeTruthy();
  });

  test('two presses in one do not confirm the next plate unseen', async () => {
    const { user } = openBench(new FakeApi(makeRun(version), version));
    await user.dblClick(await button(/^H-3 says/u));
    expect(await button(/^Q-B says/u)).toBeTruthy();
    expect(screen.queryByRole('button', { name: /^Record/u })).toBeNull();
  });

  test('another reading is answered with its cost, and kept as it was typed', async () => {
    const api = new FakeApi(makeRun(version), version);
    const { user } = openBench(api);
    await user.click(await button('It says something else'));
    const typed = ((dials[0]?.[0] ?? 0) - 0.1).toFixed(1);
    await user.type(await screen.findByRole('textbox', { name: 'H-3 says, degrees' }), typed);
    expect(
      screen.getByText(new RegExp(`${typed} is 0\\.1° (?:short of|past) ${said(0, 0)}`, 'u')),
    ).toBeTruthy();
    expect(screen.getByText(/Turn once more, or keep what you dialled/u)).toBeTruthy();
    await user.click(await button(`Keep ${typed}`));
    expect(screen.getByText(`dialled ${typed}`)).toBeTruthy();
  });

  test('a number that is no reading is explained and nothing is kept', async () => {
    const { user } = openBench(new FakeApi(makeRun(version), version));
    await user.click(await button('It says something else'));
    await user.type(await screen.findByRole('textbox', { name: 'H-3 says, degrees' }), '400');
    await user.click(await button('Keep what it says'));
    expect(screen.getByText(/A dial reads from 0 to below 360/u)).toBeTruthy();
    await user.keyboard('{Escape}');
    expect(await button(`H-3 says ${said(0, 0)}`)).toBeTruthy();
  });

  test('keys: Space confirms, b goes back one, t notes trouble; none of them inside a field', async () => {
    const { user } = openBench(new FakeApi(makeRun(version), version));
    await button(/^H-3 says/u);
    await user.keyboard(' ');
    await button(/^Q-B says/u);
    await user.keyboard('b');
    await button(/^H-3 says/u);
    await user.keyboard('t');
    const field = await screen.findByRole('textbox', { name: 'what is in the way' });
    await user.type(field, 'bt e');
    expect(screen.getByDisplayValue('bt e')).toBeTruthy();
    expect(screen.getByRole('dialog', { name: 'Trouble at setting 1' })).toBeTruthy();
  });

  test('a setting is skipped with its reason, and not without one', async () => {
    const api = new FakeApi(makeRun(version), version);
    const { user } = openBench(api);
    await user.click(await button('Note trouble'));
    await user.click(await button('Skip setting 1'));
    expect(screen.getByText(/A skipped setting needs its reason/u)).toBeTruthy();
    await user.type(screen.getByRole('textbox', { name: 'what is in the way' }), 'shutter stuck');
    await user.click(await button('Skip setting 1'));
    await waitFor(() => expect(api.run.readings[0]?.note).toBe('shutter stuck'));
    expect(api.run.readings[0]?.outcome).toBe('skipped');
    expect(await screen.findByText(/setting 1 was skipped: “shutter stuck”/u)).toBeTruthy();
  });

  test('without the network a reading waits, says so, and goes out once with the key it was made with', async () => {
    const api = new FakeApi(makeRun(version), version);
    const first = openBench(api);
    api.failWith = 'network';
    await confirmAll(first.user, 0);
    await first.user.click(await button('Record and go to 2'));
    expect(await screen.findByText(/one reading waits on this device and goes out by itself/u)).toBeTruthy();
    const tried = api.posts('/readings')[0]?.key;
    first.unmount();
    // The page went; the reading did not.
    openBench(api);
    await button(`H-3 says ${said(1, 0)}`);
    await screen.findByText(/one reading waits on this device/u);
    // The page listens for the network a moment after it has said so.
    await handMoves();
    api.failWith = null;
    window.dispatchEvent(new Event('online'));
    await waitFor(() => expect(api.run.readings).toHaveLength(1));
    expect(new Set(api.posts('/readings').map(({ key }) => key))).toEqual(new Set([tried]));
    await waitFor(() => expect(screen.queryByText(/one reading waits/u)).toBeNull());
  });

  test('a network that takes the reading and says nothing is given up after 15 seconds, and said', async () => {
    const timers: { ms: number; give: () => void }[] = [];
    vi.spyOn(AbortSignal, 'timeout').mockImplementation((ms) => {
      const controller = new AbortController();
      timers.push({ ms, give: () => controller.abort() });
      return controller.signal;
    });
    const api = new FakeApi(makeRun(version), version);
    const { user } = openBench(api);
    api.failWith = 'silence';
    await confirmAll(user, 0);
    await user.click(await button('Record and go to 2'));
    expect(screen.queryByText(/No answer from the server/u)).toBeNull();
    expect(timers.map(({ ms }) => ms)).toEqual([15_000]);
    timers[0]?.give();
    expect(await screen.findByText(/No answer from the server since/u)).toBeTruthy();
    vi.restoreAllMocks();
  });

  test('a reading that another tab has sent leaves this one’s queue, and the run is fetched again', async () => {
    const api = new FakeApi(makeRun(version), version);
    const { user } = openBench(api);
    api.failWith = 'network';
    await confirmAll(user, 0);
    await user.click(await button('Record and go to 2'));
    await screen.findByText(/one reading waits on this device/u);
    const slot = Object.keys(localStorage).find((name) => name.includes('.reading.')) ?? '';
    const fetched = () => api.asked.filter(({ method, path }) => method === 'GET' && path.includes('/runs/'));
    const before = fetched().length;
    localStorage.removeItem(slot);
    window.dispatchEvent(new StorageEvent('storage', { key: slot, newValue: null }));
    await waitFor(() => expect(screen.queryByText(/one reading waits/u)).toBeNull());
    expect(fetched().length).toBe(before + 1);
  });

  test('where somebody else was faster, the page shows what the run has become', async () => {
    const run = makeRun(version);
    const api = new FakeApi({ ...run, summary: { ...run.summary, state: 'paused' } }, version);
    const { user } = openBench(api);
    await button('Resume at setting 1');
    api.run = run;
    api.failWith = { status: 409, detail: 'Run 231 is running already.' };
    await user.click(await button('Resume at setting 1'));
    expect(await button(/^H-3 says/u)).toBeTruthy();
  });

  test('a finished run leaves nothing on the device but what never reached the server, until that is dropped', async () => {
    const run = makeRun(version);
    const api = new FakeApi(run, version);
    const first = openBench(api);
    api.failWith = 'network';
    await confirmAll(first.user, 0);
    await first.user.click(await button('Record and go to 2'));
    await screen.findByText(/one reading waits on this device/u);
    first.unmount();
    api.run = {
      ...run,
      summary: { ...run.summary, state: 'finished', finishedAt: '2026-11-30T10:00:00.000Z' },
    };
    const { user } = openBench(api);
    expect(await screen.findByText(/did not reach the server before the run was finished/u)).toBeTruthy();
    await user.click(await button('Drop it from this device'));
    expect(Object.keys(localStorage).filter((name) => name.startsWith('quarterturn.bench'))).toEqual([]);
  });

  /** What another tablet records: the two first settings, as wanted. */
  const elsewhere = (settings: readonly number[]): Run['readings'] =>
    settings.map((settingIndex, index) => ({
      id: id(800 + index),
      sequence: index + 1,
      settingIndex,
      outcome: 'done',
      dialledDeg: [...(dials[settingIndex] ?? [])],
      note: '',
      recordedAt: '2026-11-30T09:20:00.000Z',
      recordedBy: 'Ines Okafor',
    }));

  test('a confirmation kept from before readings that another tablet recorded is dropped, and the first open setting opens', async () => {
    const run = makeRun(version);
    const first = openBench(new FakeApi(run, version));
    await first.user.click(await button(`H-3 says ${said(0, 0)}`));
    expect(await screen.findByText(`dialled ${said(0, 0)}`)).toBeTruthy();
    first.unmount();
    openBench(new FakeApi({ ...run, readings: elsewhere([0, 1]) }, version));
    expect(await screen.findByRole('heading', { name: /Setting 3 of 4/u })).toBeTruthy();
    expect(await button(`H-3 says ${said(2, 0)}`)).toBeTruthy();
    expect(screen.queryByText(/^dialled /u)).toBeNull();
  });

  test.each([
    ['focus', () => window.dispatchEvent(new Event('focus'))],
    ['being seen again', () => document.dispatchEvent(new Event('visibilitychange', { bubbles: true }))],
  ])('on %s a page learns what was recorded elsewhere and leaves the setting', async (_, comesBack) => {
    const run = makeRun(version);
    const api = new FakeApi(run, version);
    const { user } = openBench(api);
    await user.click(await button(`H-3 says ${said(0, 0)}`));
    api.run = { ...run, readings: elsewhere([0]) };
    comesBack();
    expect(await screen.findByRole('heading', { name: /Setting 2 of 4/u })).toBeTruthy();
    expect(screen.queryByText(/^dialled /u)).toBeNull();
  });

  test('its own reading, once acknowledged, takes no confirmation of the next setting away', async () => {
    const api = new FakeApi(makeRun(version), version);
    const first = openBench(api);
    api.failWith = 'network';
    await confirmAll(first.user, 0);
    await first.user.click(await button('Record and go to 2'));
    await screen.findByText(/one reading waits on this device/u);
    await handMoves();
    await first.user.click(await button(`H-3 says ${said(1, 0)}`));
    api.failWith = null;
    window.dispatchEvent(new Event('online'));
    await waitFor(() => expect(screen.queryByText(/one reading waits/u)).toBeNull());
    first.unmount();
    openBench(api);
    expect(await screen.findByText(`dialled ${said(1, 0)}`)).toBeTruthy();
  });

  test('a reading that the server refuses stays, with what the server said', async () => {
    const api = new FakeApi(makeRun(version), version);
    const { user } = openBench(api);
    api.failWith = { status: 409, detail: 'Run 231 is paused. Resume it first.' };
    await confirmAll(user, 0);
    await user.click(await button('Record and go to 2'));
    expect(await screen.findByText(/Run 231 is paused. Resume it first/u)).toBeTruthy();
    api.failWith = null;
    await user.click(await button('Send again'));
    await waitFor(() => expect(api.run.readings).toHaveLength(1));
  });

  test('a paused run says why and where, and is resumed there', async () => {
    const run = makeRun(version);
    const api = new FakeApi(
      { ...run, summary: { ...run.summary, state: 'paused', pauseNote: 'key is with Ines' } },
      version,
    );
    const { user } = openBench(api);
    expect(await screen.findByText('“key is with Ines”')).toBeTruthy();
    await user.click(await button('Resume at setting 1'));
    await button(/^H-3 says/u);
    expect(api.posts('/resume')).toHaveLength(1);
  });

  test('when all is passed the run is finished and becomes its record', async () => {
    const run = makeRun(version);
    const readings = dials.map((dialledDeg, settingIndex) => ({
      id: version.content.targets[settingIndex]?.id ?? '',
      sequence: settingIndex + 1,
      settingIndex,
      outcome: settingIndex === 2 ? ('skipped' as const) : ('done' as const),
      dialledDeg: settingIndex === 2 ? [] : [...dialledDeg],
      note: settingIndex === 2 ? 'shutter stuck' : '',
      recordedAt: '2026-11-30T09:30:00.000Z',
      recordedBy: 'Jonas Brandt',
    }));
    const api = new FakeApi({ ...run, readings }, version);
    const { user } = openBench(api);
    expect(await screen.findByText('3 of 4 settings are recorded, 1 skipped')).toBeTruthy();
    expect(await button('Do setting 3')).toBeTruthy();
    await user.click(await button('Finish the run'));
    expect(
      await screen.findByRole('heading', { name: /Run 231 of Tetrahedron, signal arm, finished/u }),
    ).toBeTruthy();
    expect(screen.getByText('skipped: “shutter stuck”')).toBeTruthy();
    // The chip's point stands at the number beside it: 1 − F of what was dialled.
    const made = infidelityAscii(madeOf(version.content, 1, dials[1] ?? []) ?? NaN).replace('-', '\u2212');
    const chip = document.querySelectorAll('tbody tr')[1]?.querySelector('svg[role="img"]');
    expect(chip?.getAttribute('aria-label')).toMatch(new RegExp(`^1 − F ${made.replace('.', '\\.')},`, 'u'));
  });

  test('leaving a run in progress asks once', async () => {
    const { user, router } = openBench(new FakeApi(makeRun(version), version));
    await button(/^H-3 says/u);
    await user.click(screen.getByRole('link', { name: 'Plan' }));
    expect(await screen.findByText('Leave run 231 at setting 1?')).toBeTruthy();
    await user.click(screen.getByRole('button', { name: 'Stay at the bench', hidden: true }));
    await waitFor(() => expect(screen.queryByText('Leave run 231 at setting 1?')).toBeNull());
    await user.click(screen.getByRole('link', { name: 'Plan' }));
    await user.click(await screen.findByRole('button', { name: 'Leave the run standing', hidden: true }));
    await waitFor(() => expect(router.state.location.pathname).toMatch(/\/plan$/u));
  });

  test('from the source side the words turn round, and every ring says so', async () => {
    const { user } = openBench(new FakeApi(makeRun(version), version));
    await button(/^H-3 says/u);
    const before = screen.getByText(/^H-3, turn/u).textContent;
    await user.keyboard('?');
    await user.click(await button('I stand on the source side'));
    await user.keyboard('{Escape}');
    const after = screen.getByText(/^H-3, turn/u).textContent;
    expect(after.includes('counter-clockwise')).toBe(!before.includes('counter-clockwise'));
    expect(screen.getAllByText(/seen from the source side$/u).length).toBeGreaterThanOrEqual(2);
  });

  test('a guest sees where the run stands, has nothing to confirm, and is told so', async () => {
    openBench(new FakeApi(makeRun(version), version), { role: 'guest' });
    expect(await screen.findByRole('heading', { name: /Setting 1 of 4/u })).toBeTruthy();
    expect(screen.getByText('You are reading run 231; nothing can be recorded from here.')).toBeTruthy();
    expect(screen.queryByRole('button', { name: /says/u })).toBeNull();
    expect(screen.queryByRole('button', { name: 'Note trouble' })).toBeNull();
  });
});
