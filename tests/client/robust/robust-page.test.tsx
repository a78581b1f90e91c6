// @vitest-environment jsdom
import { QueryClientProvider } from '@tanstack/react-query';
import { act, cleanup, render, screen, waitFor, within } from '@testing-library/react';
import userEvent from '@testing-library/user-event';
import { createMemoryRouter, RouterProvider } from 'react-router-dom';
import { afterEach, beforeEach, describe, expect, it, vi } from 'vitest';
import { DEFAULT_CONVENTION } from '../../../shared/optics';
import { LabContext, type LabContextValue } from '../../../src/features/labs';
import { Component as RobustPage } from '../../../src/features/robust/RobustPage';
import { createQueryClient } from '../../../src/lib/query-client';
import { robustStudy } from '../../../src/workers/robust-study';
import type { StudyAnswer, StudyRequest } from '../../../src/workers/study-messages';
import { bench, id, plate } from './fixture';

/** The study's worker on this thread: told to go on by the test, so that its states can be looked at one by one. */
class HeldWorker extends EventTarget {
  static readonly all: HeldWorker[] = [];
  request: StudyRequest | null = null;
  ended = false;
  constructor() {
    super();
    HeldWorker.all.push(this);
  }
  postMessage(request: StudyRequest): void {
    this.request = request;
  }
  terminate(): void {
    this.ended = true;
  }
  private tell(data: StudyAnswer): void {
    this.dispatchEvent(new MessageEvent('message', { data }));
  }
  work(share: number): void {
    this.tell({ state: 'working', share });
  }
  finish(): void {
    if (this.request?.kind !== 'robust') throw new Error('no robust study was asked for');
    const steps = robustStudy(this.request.question);
    for (;;) {
      const step = steps.next();
      if (step.done === true) {
        this.tell({ state: 'done', result: { kind: 'robust', study: step.value } });
        return;
      }
    }
  }
}

const gateBench = bench(7, 'gate bench', [
  plate(1, 'H-A', 180),
  plate(2, 'H-B', 180),
  plate(3, 'H-C', 180, { material: null }),
]);
const singleBench = bench(8, 'lone arm', [plate(4, 'Q-A', 90)]);

const waitingBench = {
  ...bench(9, 'signal arm', []),
  notReady: [{ plateId: id(2), name: 'H-B', part: 'preparation', why: 'not-calibrated' }],
};

const lab: LabContextValue = {
  lab: {
    id: id(1),
    name: 'Harbour Street',
    convention: DEFAULT_CONVENTION,
    calibrationDueDays: 90,
  },
  // A guest may read, and this page writes nothing.
  member: { userId: id(3), labId: id(1), role: 'guest' },
  user: { id: id(3), name: 'Sami Oduya', login: 'sami', email: null },
};

beforeEach(() => {
  HeldWorker.all.length = 0;
  vi.stubGlobal('Worker', HeldWorker);
  // jsdom lays nothing out, so it has nothing to scroll.
  Object.defineProperty(Element.prototype, 'scrollIntoView', { value: () => undefined, configurable: true });
  vi.stubGlobal('fetch', () =>
    Promise.resolve(
      new Response(JSON.stringify({ items: [gateBench, singleBench, waitingBench] }), { status: 200 }),
    ),
  );
});

afterEach(() => {
  cleanup();
  vi.unstubAllGlobals();
});

function open(search = '') {
  const router = createMemoryRouter([{ path: '/labs/:labId/plan/robust', Component: RobustPage }], {
    initialEntries: [`/labs/${id(1)}/plan/robust${search}`],
  });
  const user = userEvent.setup();
  render(
    <QueryClientProvider client={createQueryClient()}>
      <LabContext.Provider value={lab}>
        <RouterProvider router={router} />
      </LabContext.Provider>
    </QueryClientProvider>,
  );
  return { router, user };
}

const button = (name: RegExp | string) => screen.getByRole('button', { name });
const settingsTable = () => screen.getByRole('table', { name: /^Composite settings found/u });
function worker(): HeldWorker {
  const last = HeldWorker.all.at(-1);
  if (last === undefined) throw new Error('no worker was started');
  return last;
}
const finish = () => act(() => worker().finish());

async function few(user: ReturnType<typeof userEvent.setup>) {
  await user.click(screen.getByText('How it searches'));
  const starts = screen.getByRole('textbox', { name: 'starts' });
  await user.clear(starts);
  await user.type(starts, '6');
}

async function searched() {
  const opened = open();
  await few(opened.user);
  await opened.user.click(button('Search for settings'));
  finish();
  return opened;
}

describe('the page of robust designs', () => {
  it('begins without a search, and with the published composites', () => {
    open();
    expect(screen.getByText('No search yet')).toBeDefined();
    expect(HeldWorker.all).toHaveLength(0);
    expect(screen.getByRole('table', { name: 'Published composites' })).toBeDefined();
  });

  it('does not search with a bench that waits for a plate, and says which and why', async () => {
    const { user } = open();
    await user.selectOptions(
      await screen.findByRole('combobox', { name: 'with the plates of' }),
      await screen.findByRole('option', { name: 'signal arm: waits for H-B' }),
    );
    expect(
      await screen.findByText(/^H-B has not been calibrated since it was seated\. Calibrate it/u),
    ).toBeDefined();
    await user.click(button(/^Search for settings/));
    expect(HeldWorker.all).toHaveLength(0);
  });

  it('searches, tells how far it is, and can be stopped', async () => {
    const { user } = open();
    await user.click(button('Search for settings'));
    act(() => worker().work(0.5));
    expect(await screen.findByText('Searching, start 20 of 40')).toBeDefined();
    await user.click(button('Cancel the search'));
    expect(worker().ended).toBe(true);
    expect(screen.getByText('No search yet')).toBeDefined();
  });

  it('lists what it found against the plain solution, and draws the first', async () => {
    await searched();
    const first = within(settingsTable()).getAllByRole('row')[1];
    expect(first?.textContent).toContain('cancels first order');
    expect(first?.textContent).toMatch(/90 times better/u);
    expect(first?.getAttribute('aria-current')).toBe('true');
    expect(screen.getByRole('heading', { name: 'Setting 1, and the plain solution' })).toBeDefined();
    const drawn = screen.getByRole('region', { name: /^Setting 1/u });
    expect(drawn.textContent).toContain('1 − F falls as ε4 towards no error');
    expect(drawn.textContent).toContain('the plain solution as ε2');
    expect(
      within(drawn).getByRole('img', { name: /^Plot of 1 − F against the common relative error/u }),
    ).toBeDefined();
  });

  it('draws another setting when its row is chosen by key', async () => {
    const { user } = await searched();
    const second = within(settingsTable()).getByRole('button', { name: /^2/u });
    second.focus();
    await user.keyboard('{Enter}');
    expect(screen.getByRole('heading', { name: 'Setting 2, and the plain solution' })).toBeDefined();
    expect(second.getAttribute('aria-pressed')).toBe('true');
  });

  it('says the plot as a table, with what is not within the tolerance', async () => {
    const { user } = await searched();
    await user.click(button('as a table'));
    const table = screen.getByRole('table', { name: /^1 − F by the common relative error/u });
    const rows = within(table).getAllByRole('row');
    expect(rows).toHaveLength(22);
    expect(rows[1]?.textContent).toContain('−20');
    expect(rows[1]?.textContent).toContain('not within');
    expect(rows[11]?.textContent).not.toContain('not within');
  });

  it('shows the path on the sphere at the error that is asked for', async () => {
    const { user } = await searched();
    const way = screen.getByRole('region', { name: 'The way of the light' });
    expect(within(way).getByRole('img').getAttribute('aria-label')).toContain('plate 1 turns it by 180.0°');
    const field = within(way).getByRole('textbox', { name: 'at an error of, %' });
    await user.clear(field);
    await user.type(field, '5{Enter}');
    expect(within(way).getByRole('img').getAttribute('aria-label')).toContain('plate 1 turns it by 189.0°');
    expect(way.textContent).toContain('With this error');
    await user.click(button('No error'));
    expect(within(way).getByRole('img').getAttribute('aria-label')).toContain('plate 1 turns it by 180.0°');
  });

  it('copies the angles, and says so; where the browser refuses, they stand there', async () => {
    const { user } = await searched();
    await user.click(button('Copy the angles'));
    expect(await screen.findByText('Copied, one plate a line.')).toBeDefined();
    expect(await navigator.clipboard.readText()).toMatch(/^Setting 1, for X\n[\x20-\x7e\n]+$/u);
    vi.spyOn(navigator.clipboard, 'writeText').mockRejectedValue(new Error('refused'));
    await user.click(within(settingsTable()).getByRole('button', { name: /^2/u }));
    await user.click(button('Copy the angles'));
    const text: HTMLTextAreaElement = await screen.findByRole('textbox', { name: 'the setting as text' });
    expect(text.value).toContain('Setting 2, for X');
  });

  it('says that a changed question is not the one answered, and keeps the answer', async () => {
    const { user } = await searched();
    await user.type(screen.getByRole('textbox', { name: 'retardances in beam order, degrees' }), ' 180');
    expect(screen.getByText(/The question has changed since/u)).toBeDefined();
    expect(within(settingsTable()).getAllByRole('row').length).toBeGreaterThan(1);
  });

  it('says where it can’t read what is typed, and searches only then when it can', async () => {
    const { user } = open();
    const field = screen.getByRole('textbox', { name: 'unitary' });
    await user.clear(field);
    await user.type(field, 'rotate(x, 90)');
    expect(await screen.findByText(/^Column 11:/u)).toBeDefined();
    await user.click(button(/^Search for settings/u));
    expect(HeldWorker.all).toHaveLength(0);
    await user.click(button('Write 90deg'));
    await user.click(button('Search for settings'));
    expect(HeldWorker.all).toHaveLength(1);
  });

  it('says that a bench has too few plates, and of which plate the wavelength is not known', async () => {
    const { user } = open();
    const choice = await screen.findByRole('combobox', { name: 'with the plates of' });
    await screen.findByRole('option', { name: /^lone arm/u });
    await user.selectOptions(choice, singleBench.id);
    expect(screen.getByText(/One plate has nothing to cancel an error with/u)).toBeDefined();
    await user.selectOptions(choice, gateBench.id);
    await user.click(screen.getByRole('radio', { name: 'the wavelength' }));
    expect(screen.getByRole('alert').textContent).toContain('H-C: the material of the plate is not known');
  });

  it('gives dials for a bench’s plates', async () => {
    open(`?unitary=X&bench=${gateBench.id}&against=retardance&within=10&starts=6&seed=1&tolerance=1e-3`);
    await waitFor(() => expect(HeldWorker.all).toHaveLength(1));
    finish();
    expect(within(settingsTable()).getByRole('columnheader', { name: 'H-A dial θ' })).toBeDefined();
    expect(screen.getByRole('region', { name: /^Setting 1/u }).textContent).toContain('Rounded to the dials');
  });

  it('says plainly that a goal is out of reach', async () => {
    open('?unitary=X&plates=85+85&against=retardance&within=10&starts=6&seed=1&tolerance=1e-3');
    await waitFor(() => expect(HeldWorker.all).toHaveLength(1));
    finish();
    expect(screen.getByText('The goal is out of reach of these plates by 10.00°')).toBeDefined();
  });

  it('keeps the question in its address, and answers it when the address is opened', async () => {
    const { router, user } = open();
    const field = screen.getByRole('textbox', { name: 'unitary' });
    await user.clear(field);
    await user.type(field, 'hadamard');
    await waitFor(() => expect(router.state.location.search).toContain('unitary=hadamard'));
    const { search } = router.state.location;
    cleanup();
    open(search);
    await waitFor(() => expect(HeldWorker.all).toHaveLength(1));
  });

  it('draws a published composite beside its plain counterpart', async () => {
    const { user } = open();
    await user.click(button(/^Look at it ?: Wimperis: .* 90°$/u));
    const drawn = screen.getByRole('region', { name: /^Wimperis/u });
    expect(drawn.textContent).toContain('1 − F falls as ε6');
    expect(drawn.textContent).toContain('Plain is one plate of 90° at 0.00°');
    expect(screen.getByText('shown above')).toBeDefined();
    await waitFor(() => expect(drawn.contains(document.activeElement)).toBe(true));
  });
});
