import { cleanup, fireEvent, screen, waitFor, within } from '@testing-library/react';
import { afterEach, beforeAll, describe, expect, it, vi } from 'vitest';
import { address, open, problem, serve, writes } from './cabinet-harness';
import { detailFixture, mountFixture, plateFixture, seatFixture } from './plate-fixture';

const seated = plateFixture();
const out = plateFixture({ mount: null, revision: 4 });
const anew = plateFixture({ calibration: null, revision: 4 });

beforeAll(() => {
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

describe('taking a plate out of its mount', () => {
  it('says what is lost and who waits, asks why, and leaves a page that says the zero is void', async () => {
    const { served, calls } = serve({ plates: [seated], detail: detailFixture(seated) });
    const press = open('designer', `/${seated.id}?do=take-out`);
    const dialog = within(await screen.findByRole('dialog', { name: 'Take Q-B out of M05?' }));
    expect(dialog.getByText(/Its zero, 301\.73\(9\)°, is void from now on/)).toBeDefined();
    expect(dialog.getByText(/The bench signal arm waits until Q-B is seated and calibrated/)).toBeDefined();
    expect(dialog.getByText(/cannot be undone/)).toBeDefined();
    await press.click(dialog.getByRole('button', { name: 'Take Q-B out' }));
    expect(dialog.getByText('Write why Q-B is taken out.')).toBeDefined();
    expect(writes(calls)).toEqual([]);

    await press.type(dialog.getByLabelText('why Q-B is taken out'), 'Cleaned.');
    served.plates = [out];
    served.detail = detailFixture(out, {
      seats: [seatFixture(4, { leftAt: '2026-04-30T10:00:00.000Z', leftWhy: 'Cleaned.' })],
      calibrations: detailFixture(seated).calibrations,
    });
    await press.click(dialog.getByRole('button', { name: 'Take Q-B out' }));
    expect(writes(calls)).toEqual([
      {
        method: 'POST',
        path: `/plates/${seated.id}/take-out`,
        body: { why: 'Cleaned.', at: null },
        ifMatch: '"r3"',
      },
    ]);
    expect(await screen.findByRole('heading', { name: 'Q-B sits nowhere, so it has no zero' })).toBeDefined();
    expect(screen.queryByRole('dialog')).toBeNull();
    await waitFor(() => expect(address()).toBe(`/${seated.id}`));
    expect(screen.getByText(/its zeros are void\. Cleaned\./)).toBeDefined();
  });

  it('says when it was done, and shows at the time why the server refuses it', async () => {
    const { served, calls } = serve({ plates: [seated], detail: detailFixture(seated) });
    const press = open('designer', `/${seated.id}?do=take-out`);
    const dialog = within(await screen.findByRole('dialog'));
    await press.type(dialog.getByLabelText('why Q-B is taken out'), 'Cleaned.');
    const when = dialog.getByLabelText('when (your time)');
    fireEvent.change(when, { target: { value: '2026-03-01T09:30' } });
    const sentence = 'Q-B was measured in M05 at 2026-03-01 12:00 UTC, so it still sat there.';
    served.special = ({ method }) =>
      method === 'POST' ? problem(422, sentence, { fields: [{ path: 'at', message: sentence }] }) : null;
    await press.click(dialog.getByRole('button', { name: 'Take Q-B out' }));
    expect(await dialog.findAllByText(sentence)).toHaveLength(1);
    expect(when.getAttribute('aria-invalid')).toBe('true');
    expect(writes(calls)).toMatchObject([{ body: { at: new Date(2026, 2, 1, 9, 30).toISOString() } }]);
    fireEvent.change(when, { target: { value: '2026-03-02T09:30' } });
    expect(dialog.queryByText(sentence)).toBeNull();
  });

  it('keeps what was typed when somebody moved it first, and goes on from what is', async () => {
    const { served, calls } = serve({ plates: [seated], detail: detailFixture(seated) });
    const press = open('designer', `/${seated.id}?do=take-out`);
    const dialog = within(await screen.findByRole('dialog'));
    await press.type(dialog.getByLabelText('why Q-B is taken out'), 'Knocked.');
    const moved = plateFixture({ mount: { name: 'M06' }, revision: 5 });
    served.detail = detailFixture(moved);
    served.special = ({ ifMatch }) =>
      ifMatch === '"r3"' ? problem(412, 'Someone else saved this after you opened it.') : null;
    await press.click(dialog.getByRole('button', { name: 'Take Q-B out' }));
    expect(await dialog.findByText('Someone else saved this after you opened it.')).toBeDefined();
    expect(await screen.findByRole('dialog', { name: 'Take Q-B out of M06?' })).toBeDefined();
    expect(dialog.getByLabelText('why Q-B is taken out')).toHaveProperty('value', 'Knocked.');
    await press.click(dialog.getByRole('button', { name: 'Take Q-B out' }));
    await waitFor(() => expect(writes(calls).map(({ ifMatch }) => ifMatch)).toEqual(['"r3"', '"r5"']));
  });
});

describe('seating a plate', () => {
  it('anew in its own mount is one step, and the page offers the two ways to a zero', async () => {
    const { served, calls } = serve({ plates: [seated], detail: detailFixture(seated) });
    const press = open('designer', `/${seated.id}?do=seat-anew`);
    const dialog = within(await screen.findByRole('dialog', { name: /seat it anew\?$/ }));
    await press.type(dialog.getByLabelText('why Q-B is taken out'), 'Its ring was loose.');
    served.plates = [anew];
    served.detail = detailFixture(anew, { calibrations: detailFixture(seated).calibrations });
    await press.click(dialog.getByRole('button', { name: 'Seat Q-B anew in M05' }));
    expect(writes(calls)).toMatchObject([
      {
        method: 'PUT',
        path: `/plates/${seated.id}/seat`,
        body: { mountId: seated.seat?.mountId, why: 'Its ring was loose.', at: null },
      },
    ]);
    const head = await screen.findByRole('region', { name: 'Q-B’s zero is void since the new seat' });
    expect(within(head).getByRole('link', { name: 'Scan between polarisers' })).toHaveProperty(
      'href',
      expect.stringMatching(/\/scan$/),
    );
    await press.click(within(head).getByRole('link', { name: 'Record values by hand' }));
    expect(await screen.findByRole('button', { name: 'Record the calibration' })).toBeDefined();
  });

  it('takes one of the empty mounts, which are searched for by the server', async () => {
    const mount = mountFixture();
    const { calls } = serve({ plates: [out], detail: detailFixture(out), mounts: [mount] });
    const press = open('designer', `/${out.id}?do=seat`);
    const dialog = within(await screen.findByRole('dialog', { name: 'Seat Q-B?' }));
    await press.click(dialog.getByRole('button', { name: 'Seat Q-B in a mount' }));
    expect(await dialog.findByText('Choose one of the empty mounts.')).toBeDefined();
    await press.type(dialog.getByRole('searchbox'), 'M1');
    await waitFor(() =>
      expect(
        calls.some(({ path }) => /^\/mounts\?.*state=empty/.test(path) && path.includes('search=M1')),
      ).toBe(true),
    );
    await press.click(await dialog.findByRole('radio', { name: /M13/ }));
    await press.click(dialog.getByRole('button', { name: 'Seat Q-B in M13' }));
    expect(writes(calls)).toMatchObject([
      { method: 'PUT', body: { mountId: mount.id, why: '', at: null }, ifMatch: '"r4"' },
    ]);
  });

  it('into a new mount adds the mount once, however often the seating is refused', async () => {
    const mount = mountFixture({ name: 'M14' });
    const { served, calls } = serve({ plates: [out], detail: detailFixture(out), mounts: [] });
    const keys: (string | null)[] = [];
    served.special = ({ method, path }) => {
      if (method === 'POST' && path === '/mounts') return { status: 201, body: mount };
      return method === 'PUT' ? problem(409, 'Q-B is retired.') : null;
    };
    const answer = globalThis.fetch;
    vi.stubGlobal('fetch', (url: string, init: RequestInit = {}) => {
      if (init.method === 'POST') keys.push(new Headers(init.headers).get('idempotency-key'));
      return answer(url, init);
    });
    const press = open('designer', `/${out.id}?do=seat`);
    const dialog = within(await screen.findByRole('dialog'));
    await press.click(dialog.getByRole('radio', { name: 'a new mount' }));
    await press.type(dialog.getByLabelText('mount’s name'), 'M14');
    await press.type(dialog.getByLabelText('finest step of its engraving, degrees'), '0.1');
    await press.type(dialog.getByLabelText('repeats within (σ), degrees'), '0.05');
    for (let round = 0; round < 2; round += 1) {
      await press.click(dialog.getByRole('button', { name: 'Seat Q-B in M14' }));
      expect(await dialog.findByText('Q-B is retired.')).toBeDefined();
    }
    expect(new Set(keys).size).toBe(1);
    expect(writes(calls).filter(({ method }) => method === 'PUT')).toMatchObject([
      { body: { mountId: mount.id } },
      { body: { mountId: mount.id } },
    ]);
  });
});
