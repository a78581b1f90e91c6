// @vitest-environment jsdom
import { QueryClientProvider } from '@tanstack/react-query';
import { act, cleanup, render, screen, waitFor } from '@testing-library/react';
import userEvent from '@testing-library/user-event';
import { MemoryRouter } from 'react-router-dom';
import { afterEach, beforeEach, describe, expect, it, vi } from 'vitest';
import { DEFAULT_CONVENTION, parseState } from '../../../shared/optics';
import type { Bench } from '../../../shared/schemas/benches';
import type { SolvingBench } from '../../../shared/protocol/solve-row';
import type { Plate } from '../../../shared/schemas/cabinet';
import { quickSettings } from '../../../src/features/quick-angles/quick-settings';
import { shortLatex } from '../../../src/features/quick-angles/StateRead';
import { Component as QuickAnglesPage } from '../../../src/features/quick-angles/QuickAnglesPage';
import type { QuickJob } from '../../../src/features/quick-angles/use-quick-settings';
import { createQueryClient } from '../../../src/lib/query-client';
import { bench as anyBench, idsFrom, plate as anyPlate } from '../../support/plates';

/** The worker on this thread; a test may hold it, to look at the page while it works. */
class NearWorker extends EventTarget {
  static held = false;
  static readonly all: NearWorker[] = [];
  private asked: QuickJob | null = null;
  answers = 0;
  constructor() {
    super();
    NearWorker.all.push(this);
  }
  postMessage(job: QuickJob): void {
    this.asked = job;
    if (!NearWorker.held) setTimeout(() => act(() => this.answer()), 0);
  }
  terminate(): void {
    this.asked = null;
  }
  answer(): void {
    if (this.asked === null) return;
    const { written, quick } = this.asked;
    this.asked = null;
    this.answers += 1;
    this.dispatchEvent(new MessageEvent('message', { data: quickSettings(written, quick) }));
  }
  fail(): void {
    this.dispatchEvent(new Event('error'));
  }
}

function worker(): NearWorker {
  const last = NearWorker.all.at(-1);
  if (last === undefined) throw new Error('no worker was started');
  return last;
}

beforeEach(() => {
  NearWorker.held = false;
  NearWorker.all.length = 0;
  vi.stubGlobal('Worker', NearWorker);
});

afterEach(() => {
  cleanup();
  vi.unstubAllGlobals();
});

const id = idsFrom('0197c3a0');

const plate = (number: number, name: string, kind: Plate['kind'], retardanceDeg: number) =>
  anyPlate({
    id: id(number),
    name,
    kind,
    mount: { name: `M-${number}`, repeatabilityDeg: 0.02 },
    calibration: { id: id(number + 100), retardanceDeg, retardanceSigmaDeg: 0.2, offsetDeg: 0 },
  });

const bench = anyBench({
  id: id(7),
  name: 'idler arm',
  // An ellipse with a hand, so that who names the hands matters.
  inputExpression: '(2 H + i V)/sqrt(5)',
  plates: [plate(1, 'Q-A', 'quarter', 90), plate(2, 'H-A', 'half', 180)],
});

/** A server with one lab and one bench, or with nobody signed in. */
function serve(signedIn: boolean, benches: readonly Bench[] = [bench]) {
  const lab = { id: id(1), name: 'Harbour Street', convention: DEFAULT_CONVENTION, calibrationDueDays: 90 };
  vi.stubGlobal('fetch', (url: string) => {
    const answer = url.endsWith('/session')
      ? {
          user: signedIn ? { id: id(3), name: 'Jonas Brandt', login: 'jonas', email: null } : null,
          labs: signedIn ? [{ id: lab.id, name: lab.name, role: 'lead' }] : [],
        }
      : url.endsWith('/benches')
        ? { items: benches }
        : lab;
    return Promise.resolve(new Response(JSON.stringify(answer), { status: 200 }));
  });
}

function open(state: string) {
  render(
    <QueryClientProvider client={createQueryClient()}>
      <MemoryRouter initialEntries={[`/quick-angles?state=${encodeURIComponent(state)}`]}>
        <QuickAnglesPage />
      </MemoryRouter>
    </QueryClientProvider>,
  );
  return userEvent.setup();
}

/** What the section of the dials says. */
const dials = () => screen.getByRole('region', { name: /^(?:Dials|Angles)$/u }).textContent;

describe('the page of quick angles', () => {
  it('gives a stranger angles for exact plates, and says of a state that cannot be read where it stops', async () => {
    serve(false);
    const user = open('H');
    expect(await screen.findByText(/Exact plates make it exactly/u)).toBeDefined();
    const field = screen.getByRole('textbox', { name: /^state/u });
    await user.clear(field);
    await user.type(field, 'H + ');
    expect(await screen.findByText(/^Column \d+:/u)).toBeDefined();
    expect(screen.getByText('They stand here as soon as it can be read.')).toBeDefined();
  });

  it('offers the nearest unitary for a matrix that is none, and takes it', async () => {
    serve(false);
    const user = open('H');
    await user.click(await screen.findByRole('radio', { name: 'be a unitary' }));
    const field = screen.getByRole('textbox', { name: /^unitary/u });
    await user.clear(field);
    await user.click(field);
    await user.paste('matrix [[1, 0.1], [0, 1]]');
    await user.click(await screen.findByRole('button', { name: 'Write the nearest unitary' }));
    expect(screen.queryByText(/^Column \d+:/u)).toBeNull();
    expect(field).toHaveProperty('value', expect.stringMatching(/^matrix \[\[0\.99/u));
    expect(await screen.findByText(/A right-handed turn of the sphere/u)).toBeDefined();
  });

  it('sets a phase below 0 with its sign before the i', () => {
    const right = parseState('(H - i V)/sqrt(2)', DEFAULT_CONVENTION);
    if (!right.ok) throw new Error(right.error.message);
    expect(shortLatex(right.jones, DEFAULT_CONVENTION)).toBe(
      '0.707\\,|H\\rangle + 0.707\\,e^{-i\\,90.0^{\\circ}}|V\\rangle',
    );
  });

  it('solves nothing for a bench that waits for a plate, and says which and why, with the way to it', async () => {
    const notReady: Bench['notReady'] = [
      { plateId: id(2), name: 'H-A', part: 'preparation', why: 'not-seated' },
    ];
    const waiting = anyBench({ id: id(8), name: 'signal arm', plates: [], notReady });
    serve(true, [bench, waiting]);
    const user = open('D');
    await screen.findByText(/1 − F expected/u);
    await user.selectOptions(screen.getByRole('combobox', { name: 'with the plates of' }), [
      'signal arm: waits for H-A',
    ]);
    expect(dials()).toMatch(/H-A sits in no mount\. Seat it and calibrate it/u);
    expect(dials()).not.toMatch(/1 − F expected/u);
    expect(screen.getByRole('link', { name: 'See H-A' }).getAttribute('href')).toBe(
      `/labs/${id(1)}/cabinet/${id(2)}`,
    );
    await user.selectOptions(screen.getByRole('combobox', { name: 'with the plates of' }), [
      'idler arm: Q-A, H-A',
    ]);
    await waitFor(() => expect(dials()).toMatch(/1 − F expected/u));
  });

  it('reads the bench’s input in its lab’s convention, whichever one the state is written in', async () => {
    serve(true);
    const user = open('D');
    await screen.findByRole('heading', { name: 'Dials' });
    await screen.findByText(/1 − F expected/u);
    const before = dials();
    const { answers } = worker();
    // D is the same light in every convention, so nothing about its dials may change.
    await user.selectOptions(
      screen.getByRole('combobox', { name: /^written in the convention of/u }),
      'receiver-optics-wt',
    );
    await waitFor(() => expect(worker().answers).toBeGreaterThan(answers));
    expect(dials()).toBe(before);
  });

  it('keeps the old angles readable, and says what they are for, until the new ones are there', async () => {
    serve(false);
    const user = open('H');
    await screen.findByText(/Exact plates make it exactly/u);
    NearWorker.held = true;
    const field = screen.getByRole('textbox', { name: /^state/u });
    await user.type(field, ' + V');
    expect(await screen.findByText(/^These are still for H;/u)).toBeDefined();
    expect(screen.getByText(/Exact plates make it exactly/u)).toBeDefined();
    const { answers } = worker();
    // "H " is being worked on; of all that was typed meanwhile only the last is asked.
    act(() => worker().answer());
    act(() => worker().answer());
    expect(worker().answers).toBe(answers + 2);
    expect(screen.queryByText(/^These are still for/u)).toBeNull();
    expect(NearWorker.all).toHaveLength(1);
  });

  it('says that a calculation stopped, and begins the next with another worker', async () => {
    serve(false);
    NearWorker.held = true;
    const user = open('H');
    act(() => worker().fail());
    expect(screen.getByText(/The calculation stopped/u)).toBeDefined();
    NearWorker.held = false;
    await user.type(screen.getByRole('textbox', { name: /^state/u }), ' + V');
    expect(await screen.findByText(/Exact plates make it exactly/u)).toBeDefined();
    expect(NearWorker.all).toHaveLength(2);
  });

  it('takes the analyser behind a bench as exact, and says so', async () => {
    serve(true);
    const user = open('D');
    await screen.findByRole('heading', { name: 'Dials' });
    await user.click(screen.getByRole('radio', { name: 'measure a state' }));
    expect(await screen.findByText(/That polariser is taken as exact/u)).toBeDefined();
  });
});

describe('measuring a state on a bench', () => {
  it('has no part for the polariser that makes the bench’s input', () => {
    const analysed = (of: SolvingBench) =>
      quickSettings(
        { ...written, question: 'analyse' },
        { bench: of, kinds: ['quarter', 'half'], convention: DEFAULT_CONVENTION },
      );
    const settings = analysed(bench);
    expect(settings?.ok).toBe(true);
    expect(
      analysed({ ...bench, polariserSigmaDeg: 5, polariserExtinction: 0.1, inputExpression: 'not a state' }),
    ).toEqual(settings);
  });
});

// |S3| = sin 30° = 0.5: a quarter-wave plate reaches up to 0.6 from this bench's input, and a half-wave plate keeps |S3|.
const written = {
  question: 'prepare' as const,
  expression: 'ellipse(30deg, 15deg)',
  convention: DEFAULT_CONVENTION,
};
const solved = (of: SolvingBench, kinds: readonly Plate['kind'][]) => {
  const settings = quickSettings(written, { bench: of, kinds, convention: DEFAULT_CONVENTION });
  if (settings?.ok !== true) throw new Error('not solved');
  return settings;
};

describe('what the angles for exact plates would give', () => {
  it('is next to nothing where the bench’s plates are exact, in any order and with any light in', () => {
    const settings = solved(bench, ['quarter', 'half']);
    // Only the rounding of two dials to 0.1° is left: each is off by at most 0.05°, a few 1e-6 in 1 − F.
    expect(settings.idealInfidelityHere).toBeLessThan(2e-5);
    expect(settings.idealInfidelityHere).toBeGreaterThanOrEqual(0);
  });

  it('is not said where a plate’s kind does not tell what an exact one would be', () => {
    expect(solved(bench, ['quarter', 'other']).idealInfidelityHere).toBeNull();
  });
});
