import { QueryClient, QueryClientProvider } from '@tanstack/react-query';
import { cleanup, render, screen, within } from '@testing-library/react';
import userEvent from '@testing-library/user-event';
import { MemoryRouter, Route, Routes } from 'react-router-dom';
import { afterEach, beforeAll, expect, it, vi } from 'vitest';
import type { Role } from '../../../shared/permissions';
import {
  type Reliance,
  type RelianceReport,
  relianceSchema,
  type ReliantVersion,
} from '../../../shared/schemas/reliance';
import { plateFixture } from '../cabinet/plate-fixture';
import { LabContext } from '../../../src/features/labs';
import { ReliesOnPlate } from '../../../src/features/reliance';

const ids = (number: number) => `0190a000-0000-7000-8000-${String(number).padStart(12, '0')}`;
const lab = {
  id: ids(1),
  name: 'Tern Street quantum optics',
  convention: { phase: 'kz-wt', handedness: 'receiver', s3Sign: 'L' },
  calibrationDueDays: 90,
} as const;
const plate = { id: ids(2), name: 'Q-B' };

const tally = (out: number, infidelity: number, label: string) => ({
  within: 2 - out,
  out,
  worst: { row: 1, label, infidelity },
});

function report(change: Partial<RelianceReport> = {}): RelianceReport {
  const row = (label: string) => ({ label, frozen: 1e-5, oldDials: 4e-3, resolved: 4e-4, shortfallDeg: 0 });
  return {
    stale: true,
    voids: [],
    waits: [],
    plates: [],
    toleranceInfidelity: 1e-3,
    frozen: tally(0, 1e-5, 'R'),
    oldDials: tally(2, 4e-3, 'R'),
    resolved: tally(0, 4e-4, 'R'),
    targets: [row('R'), row('L')],
    ...change,
  };
}

function version(change: Partial<ReliantVersion> = {}): ReliantVersion {
  return {
    versionId: ids(10),
    protocolId: ids(11),
    protocolName: 'Six states',
    number: 7,
    benchName: 'signal arm',
    draftRevision: 5,
    progress: null,
    report: report(),
    ...change,
  };
}

interface Sent {
  readonly path: string;
  readonly body: unknown;
  readonly ifMatch: string | null;
}

function show(
  reliance: Partial<Reliance>,
  role: Role = 'designer',
  refusal: string | null = null,
  seat = plateFixture().seat,
) {
  const body = relianceSchema.parse({
    benches: [{ id: ids(3), name: 'signal arm' }],
    drafts: [],
    versions: [],
    ...reliance,
  });
  const sent: Sent[] = [];
  vi.stubGlobal('fetch', (path: string, init: RequestInit = {}) => {
    if (init.method !== 'POST') return Promise.resolve(new Response(JSON.stringify(body)));
    const asked: unknown = typeof init.body === 'string' ? JSON.parse(init.body) : null;
    sent.push({ path, body: asked, ifMatch: new Headers(init.headers).get('if-match') });
    if (refusal === null || sent.length > 1) return Promise.resolve(new Response('{}'));
    const problem = { type: 'urn:x', title: 'Conflict', status: 409, detail: refusal, requestId: 'r' };
    return Promise.resolve(new Response(JSON.stringify(problem), { status: 409 }));
  });
  const user = { id: ids(4), name: 'Ines Varga', login: 'ines', email: null };
  render(
    <QueryClientProvider client={new QueryClient({ defaultOptions: { queries: { retry: false } } })}>
      <LabContext value={{ lab, user, member: { userId: user.id, labId: lab.id, role } }}>
        <MemoryRouter initialEntries={['/']}>
          <Routes>
            <Route path="/" element={<ReliesOnPlate plate={{ ...plate, seat }} />} />
            <Route path="/labs/:labId/plan/:protocolId" element={<p>The designer</p>} />
          </Routes>
        </MemoryRouter>
      </LabContext>
    </QueryClientProvider>,
  );
  return sent;
}

const row = async () => within(await screen.findByRole('list', { name: 'Versions that rely on Q-B' }));
const textOf = async () => (await screen.findByRole('list', { name: /Versions/ })).textContent;

// The browser's own dialog, of which jsdom has the element only.
beforeAll(() => {
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

it('says of a version what its dials make now and what a re-solve would make', async () => {
  show({ versions: [version()] });
  const text = await textOf();
  expect(text).toContain('Six states 7');
  expect(text).toMatch(/As dialled R and L are not within tolerance, the worst 1 − F 4\.0\s*×\s*10−3/);
  expect(text).toMatch(/Re-solved every target is within reach, the worst 1 − F 4\.0\s*×\s*10−4/);
});

it('says by how much targets fall short when the plates no longer reach them', async () => {
  const short = report({
    targets: report().targets.map((target) => ({ ...target, shortfallDeg: 2.3 })),
  });
  show({ versions: [version({ report: short })] });
  expect(await textOf()).toMatch(/Re-solved R and L fall 2\.3° short, 1 − F 4\.0\s*×\s*10−4/);
});

it('calls dials void where the seat has ended, and says what keeps the bench from being solved for', async () => {
  const unseated = report({
    voids: [{ why: 'seat-ended', plateId: plate.id, plateName: 'Q-B' }],
    oldDials: null,
    resolved: null,
    waits: [
      'Q-B has not been calibrated since it was seated. Calibrate it, then signal arm can be used again.',
    ],
  });
  show({ versions: [version({ report: unseated })] });
  const text = await textOf();
  expect(text).toContain('Its dials are void: Q-B left the seat that they were solved for.');
  expect(text).toContain('Calibrate it, then signal arm can be used again.');
  expect(screen.getByText(/every dial of Q-B is wrong until re-solved/)).toBeDefined();
});

it('shows the rows that are worked out while the numbers before them stay', async () => {
  show({ versions: [version({ progress: { done: 3, total: 8 } })] });
  expect(await textOf()).toContain('As dialled R and L');
  const bar = await screen.findByRole('progressbar');
  expect(bar.getAttribute('aria-valuetext')).toBe('Working out what its dials make now, row 3 of 8');
});

it('offers one step to a draft to those who write protocols, and none for a version that holds', async () => {
  show({ versions: [version()] }, 'guest');
  await row();
  expect(screen.queryByRole('button')).toBeNull();
  cleanup();
  show({ versions: [version({ report: null })] });
  expect(await textOf()).toContain('its dials hold');
  expect(screen.queryByRole('button')).toBeNull();
});

it('makes the draft against the revision that it was shown, and opens it', async () => {
  const sent = show({ versions: [version()] });
  await userEvent.click((await row()).getByRole('button', { name: /Re-solve in a draft/ }));
  expect(await screen.findByText('The designer')).toBeDefined();
  expect(sent).toEqual([
    {
      path: `/api/v1/labs/${lab.id}/protocols/${ids(11)}/draft/from-version`,
      body: { number: 7, replace: false },
      ifMatch: '"r5"',
    },
  ]);
});

it('asks before it replaces a draft that holds changes of its own, with both named', async () => {
  const sent = show(
    { versions: [version()] },
    'lead',
    'The draft of Six states, saved by Tomas, holds changes.',
  );
  await userEvent.click((await row()).getByRole('button', { name: /Re-solve in a draft/ }));
  const dialog = within(await screen.findByRole('dialog', { name: 'Replace the draft of Six states?' }));
  expect(dialog.getByText('The draft of Six states, saved by Tomas, holds changes.')).toBeDefined();
  expect(dialog.getByRole('link', { name: 'Open the draft as it is' })).toBeDefined();
  await userEvent.click(dialog.getByRole('button', { name: 'Replace the draft' }));
  expect(await screen.findByText('The designer')).toBeDefined();
  expect(sent.map(({ body }) => body)).toEqual([
    { number: 7, replace: false },
    { number: 7, replace: true },
  ]);
});

it('says so where nothing relies on a plate', async () => {
  show({ benches: [] });
  expect(await screen.findByText(/No bench has it in its beam/)).toBeDefined();
});

it('has no way to a draft while nothing can be solved, and no plate in a beam that sits nowhere', async () => {
  const waits = ['Q-B sits in no mount.'];
  const blocked = report({
    voids: [{ why: 'seat-ended', plateId: plate.id, plateName: 'Q-B' }],
    waits,
    oldDials: null,
    resolved: null,
  });
  show({ versions: [version({ report: blocked })] }, 'designer', null, null);
  expect(await textOf()).toContain('Q-B sits in no mount.');
  expect(screen.queryByRole('button', { name: /^Re-solve in a draft/ })).toBeNull();
  expect(screen.getByText(/^It has a place, empty now, in the beam of signal arm/)).toBeDefined();
});
