// @vitest-environment jsdom
import { QueryClientProvider } from '@tanstack/react-query';
import { cleanup, render, screen, waitFor, within } from '@testing-library/react';
import userEvent from '@testing-library/user-event';
import { createMemoryRouter, RouterProvider } from 'react-router-dom';
import { afterEach, describe, expect, it, vi } from 'vitest';
import { CONVENTION_SETS } from '../../../shared/optics';
import { Component as ConventionsPage } from '../../../src/features/conventions/ConventionsPage';
import { createQueryClient } from '../../../src/lib/query-client';

afterEach(() => {
  cleanup();
  vi.unstubAllGlobals();
});

const lab = {
  id: '0197c3a0-0000-7000-8000-000000000001',
  name: 'Tern Street quantum optics',
  convention: { phase: 'wt-kz', handedness: 'source', s3Sign: 'R' },
  calibrationDueDays: 90,
} as const;

/** A server with one lab, with nobody signed in, or that refuses everything. */
function serve(as: 'member' | 'stranger' | 'broken') {
  vi.stubGlobal('fetch', (url: string) => {
    if (as === 'broken') return Promise.resolve(new Response('', { status: 500 }));
    const session =
      as === 'member'
        ? {
            user: { id: lab.id, name: 'Ines Varga', login: 'iv', email: null },
            labs: [{ id: lab.id, name: lab.name, role: 'lead' }],
          }
        : { user: null, labs: [] };
    return Promise.resolve(
      new Response(JSON.stringify(url.endsWith('/session') ? session : lab), { status: 200 }),
    );
  });
}

function open(...addresses: readonly string[]) {
  const router = createMemoryRouter([{ path: '/conventions', Component: ConventionsPage }], {
    initialEntries: [...addresses],
    initialIndex: addresses.length - 1,
  });
  render(
    <QueryClientProvider client={createQueryClient()}>
      <RouterProvider router={router} />
    </QueryClientProvider>,
  );
  return { router, user: userEvent.setup() };
}
const address = (state: string, set: string) => `/conventions?state=${encodeURIComponent(state)}&in=${set}`;
const row = (name: RegExp) => screen.getByRole('row', { name });

describe('the page of conventions', () => {
  it('shows a stranger the typed convention first and all published sets, even where the server fails', async () => {
    serve('broken');
    open(address('(H + i V)/sqrt(2)', 'positive-helicity'));
    const rows = within(await screen.findByRole('table', { name: /same light/u })).getAllByRole('row');
    // Two rows of heads, what was typed, and the sets.
    expect(rows).toHaveLength(2 + 1 + CONVENTION_SETS.length);
    expect(rows[2]?.textContent).toMatch(/^As typed/u);
    expect(screen.getByText('The field turns counter-clockwise for the receiver.')).toBeDefined();
    expect(
      screen.getByText(/^One of the eight writes this light as you do; five call it left/u),
    ).toBeDefined();
    expect(row(/^IEEE, source view/u).textContent).toMatch(/differs: Jones vector, hand and Bloch y$/u);
    expect(row(/^Physics texts/u).textContent).toMatch(/typed in this$/u);
  });

  it('puts a member’s own lab first, and reads in its convention what no address says otherwise', async () => {
    serve('member');
    const { router } = open('/conventions?state=R');
    await screen.findByText(lab.name, {}, { timeout: 10_000 });
    const own = row(/^Tern Street/u);
    expect(own.textContent).toMatch(/right \(R\)/u);
    expect(own.textContent).toMatch(/typed in this$/u);
    // What can be sent names the flags, so that a colleague's lab does not read it as its own.
    await waitFor(() => expect(router.state.location.search).toContain('in=wt-kz.source.R'));
    expect(screen.getByRole('combobox', { name: /^typed in the convention/u })).toHaveProperty(
      'value',
      'wt-kz.source.R',
    );
  });

  it('keeps the address up to date without a step in the history, and goes back to what stood there', async () => {
    serve('stranger');
    const { router, user } = open(address('D', 'iau-1974'), address('H', 'ieee-source'));
    const field = await screen.findByRole('textbox', { name: 'state' });
    await user.clear(field);
    await user.type(field, 'V');
    await waitFor(() => expect(router.state.location.search).toBe('?state=V&in=ieee-source'));
    await user.selectOptions(screen.getByRole('combobox', { name: /^typed in/u }), 'particle-helicity');
    await waitFor(() => expect(router.state.location.search).toBe('?state=V&in=particle-helicity'));
    await router.navigate(-1);
    await waitFor(() => expect(screen.getByRole('textbox', { name: 'state' })).toHaveProperty('value', 'D'));
    expect(screen.getByRole('combobox', { name: /^typed in/u })).toHaveProperty('value', 'iau-1974');
  });

  it('says where a state cannot be read, and writes what it suggests at a press', async () => {
    serve('stranger');
    const { user } = open(address('cos(22.5) H + sin(22.5deg) V', 'ieee-source'));
    expect(await screen.findByText(/Column 5: 22\.5 of what\?/u)).toBeDefined();
    expect(screen.queryByRole('table', { name: /same light/u })).toBeNull();
    await user.click(screen.getByRole('button', { name: 'Write 22.5deg' }));
    expect(screen.getByRole('textbox', { name: 'state' })).toHaveProperty(
      'value',
      'cos(22.5deg) H + sin(22.5deg) V',
    );
    expect(await screen.findByRole('table', { name: /same light/u })).toBeDefined();
  });

  it('offers a way on from an empty field, and says so of a convention that it does not know', async () => {
    serve('stranger');
    const { user } = open('/conventions?state=&in=nonsense');
    expect(screen.getByText(/names a convention that is not known here, “nonsense”/u)).toBeDefined();
    await user.click(screen.getByRole('button', { name: '(H + i V)/sqrt(2)' }));
    expect(await screen.findByText(/turns counter-clockwise for the receiver/u)).toBeDefined();
  });

  it('says the degree of partly polarised light', async () => {
    serve('stranger');
    open(address('stokes(0.3, 0, 0.4)', 'iau-1974'));
    expect(await screen.findByText(/degree of polarisation is 0\.500/u)).toBeDefined();
  });

  it('compares a unitary by its matrix and Mueller matrix', async () => {
    serve('stranger');
    const { router, user } = open(address('H', 'positive-helicity'));
    await user.click(await screen.findByRole('radio', { name: 'a unitary' }));
    const table = await screen.findByRole('table', { name: /same unitary/u });
    expect(within(table).getByRole('columnheader', { name: /^Mueller matrix/u })).toBeDefined();
    expect(screen.getByText(/^It passes a line at 45\.0° first/u)).toBeDefined();
    await waitFor(() => expect(router.state.location.search).toMatch(/^\?unitary=/u));
  });

  it('copies the comparison with the name of each convention', async () => {
    serve('stranger');
    const { user } = open(address('D', 'iau-1974'));
    await user.click(await screen.findByRole('button', { name: 'Copy as text' }));
    expect(await screen.findByText('Copied, one convention a line.')).toBeDefined();
    const text = await navigator.clipboard.readText();
    expect(text).toContain('# One state in every convention: D');
    for (const { name } of CONVENTION_SETS) expect(text).toContain(name);
  });

  it('lists which sets a colleague can be using', async () => {
    serve('stranger');
    const { user } = open(address('D', 'iau-1974'));
    const part = within(await screen.findByRole('region', { name: /^Which convention/u }));
    expect(part.getByText(/^Two facts about one light are enough/u)).toBeDefined();
    await user.click(part.getByRole('radio', { name: 'counter-clockwise' }));
    await user.click(part.getByRole('radio', { name: 'right' }));
    // Of the sets, by hand: IEEE, IAU and particle physics name hands from the source; the 2001 paper leaves that open.
    expect(part.getByText('Four of the eight fit.')).toBeDefined();
    expect(part.getAllByText('calls it left')).toHaveLength(4);
    await user.type(part.getByRole('textbox'), '[[1, i]');
    await user.click(part.getByRole('radio', { name: 'clockwise' }));
    expect(part.getByText(/Certain by now/u)).toBeDefined();
  });
});
