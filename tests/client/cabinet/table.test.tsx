import { act, cleanup, screen, waitFor, within } from '@testing-library/react';
import { afterEach, describe, expect, it, vi } from 'vitest';
import { readTableView, tableAddress } from '../../../src/features/cabinet/table/table-address';
import { address, type Call, cabinet, open, problem, serve, type Served } from './cabinet-harness';
import { mountFixture, plateFixture } from './plate-fixture';

const idOf = (number: number) => `0190b000-0000-7000-8000-${String(number).padStart(12, '0')}`;
const plates = Array.from({ length: 12 }, (_, index) =>
  plateFixture({ id: idOf(index), name: `P-${index + 1}` }),
);

/** Pages of five, as a server would cut them. */
const paged: Served['special'] = ({ path }: Call) => {
  if (!path.startsWith('/plates?')) return null;
  const asked = new URLSearchParams(path.split('?')[1]);
  const from = Number(asked.get('cursor') ?? '0');
  const next = from + 5;
  const items = plates.slice(from, next);
  return { status: 200, body: { items, nextCursor: next < plates.length ? String(next) : null } };
};

/** What was last asked of the list. */
const lastAsked = (calls: readonly Call[]): Record<string, string> =>
  Object.fromEntries(
    new URLSearchParams(calls.findLast(({ path }) => path.startsWith('/plates?'))?.path.split('?')[1]),
  );

afterEach(() => {
  cleanup();
  vi.unstubAllGlobals();
});

const rows = () => within(screen.getByRole('table')).getAllByRole('rowheader');

describe('the cabinet as a table', () => {
  it('holds only the pages that were asked for, by the button or by scrolling to the end', async () => {
    serve({ special: paged });
    const seen: ((entries: readonly { isIntersecting: boolean }[]) => void)[] = [];
    vi.stubGlobal(
      'IntersectionObserver',
      class {
        constructor(notify: (entries: readonly { isIntersecting: boolean }[]) => void) {
          seen.push(notify);
        }
        observe = vi.fn();
        disconnect = vi.fn();
      },
    );
    const press = open('guest', '?view=table');
    await screen.findByRole('link', { name: 'P-1' });
    expect(rows()).toHaveLength(5);
    await press.click(screen.getByRole('button', { name: 'Show more plates' }));
    await waitFor(() => expect(rows()).toHaveLength(10));
    act(() => seen.at(-1)?.([{ isIntersecting: true }]));
    await waitFor(() => expect(rows()).toHaveLength(12));
    expect(screen.queryByRole('button', { name: 'Show more plates' })).toBeNull();
  });

  it('asks the server for what its address says', async () => {
    const { calls } = serve({ special: paged });
    open('guest', '?view=table&search=qw&health=overdue&kind=quarter&sort=age&order=desc');
    await screen.findByRole('table');
    expect(lastAsked(calls)).toEqual({
      search: 'qw',
      health: 'overdue',
      kind: 'quarter',
      sort: 'age',
      order: 'desc',
      limit: '50',
    });
    expect(screen.getByRole('searchbox')).toHaveProperty('value', 'qw');
    expect(screen.getByRole('columnheader', { name: 'calibration' }).getAttribute('aria-sort')).toBe(
      'descending',
    );
    const health = within(screen.getByRole('navigation', { name: 'health' }));
    expect(health.getByRole('link', { current: true }).textContent).toMatch(/^overdue/);
  });

  it('puts every choice into the address: filter, order and, when typing pauses, the search', async () => {
    const { calls } = serve({ plates: [plateFixture()] });
    const press = open('guest', '?view=table');
    await screen.findByRole('table');
    await press.click(screen.getByRole('link', { name: /^due/ }));
    expect(address()).toBe('?view=table&health=due');
    await press.click(screen.getByRole('link', { name: 'made for, nm' }));
    await press.click(screen.getByRole('link', { name: 'made for, nm' }));
    expect(address()).toBe('?view=table&health=due&sort=wavelength&order=desc');
    await press.keyboard('/');
    expect(document.activeElement).toBe(screen.getByRole('searchbox'));
    await press.keyboard('Q-');
    await waitFor(() => expect(address()).toContain('search=Q-'));
    await waitFor(() =>
      expect(lastAsked(calls)).toMatchObject({ search: 'Q-', health: 'due', sort: 'wavelength' }),
    );
    expect(calls.some(({ path }) => path.endsWith('search=Q'))).toBe(false);
  });

  it('counts beside each filter what it would show, with the other filter and the search as they are', async () => {
    const none = {
      calibrated: 0,
      due: 0,
      overdue: 0,
      'open-question': 0,
      'not-calibrated': 0,
      'not-seated': 0,
      retired: 0,
    };
    const { calls } = serve({
      special: paged,
      counts: {
        plates: { ...none, calibrated: 5, overdue: 2, retired: 1 },
        kinds: {
          half: { ...none, calibrated: 4, retired: 1 },
          quarter: { ...none, calibrated: 1, overdue: 2 },
          other: none,
        },
        openAxes: 0,
        mounts: 0,
      },
    });
    open('guest', '?view=table&kind=quarter&search=q');
    const health = within(await screen.findByRole('navigation', { name: 'health' }));
    await waitFor(() => expect(health.getByRole('link', { name: 'all in use 3' })).toBeDefined());
    expect(health.getByRole('link', { name: 'overdue 2' })).toBeDefined();
    expect(health.getByRole('link', { name: 'retired 0' })).toBeDefined();
    const kind = within(screen.getByRole('navigation', { name: 'kind' }));
    expect(kind.getByRole('link', { name: 'any kind 7' })).toBeDefined();
    expect(kind.getByRole('link', { name: 'half-wave 4' })).toBeDefined();
    expect(calls.some(({ path }) => path === '/cabinet?search=q')).toBe(true);
  });

  it('says in words how each plate can be trusted, and what is not known as a dash', async () => {
    serve({
      plates: [plateFixture({ health: 'overdue' }), plateFixture({ id: idOf(1), name: 'Q-F', mount: null })],
    });
    open('guest', '?view=table');
    const table = within(await screen.findByRole('table'));
    const [, overdue, out] = table.getAllByRole('row');
    expect(overdue?.textContent).toMatch(/overdue/);
    expect(out?.textContent).toMatch(/not seated/);
    expect(
      within(out ?? document.body)
        .getAllByRole('cell')
        .filter(({ textContent }) => textContent.startsWith('—')).length,
    ).toBe(5);
  });

  it('says that nothing is found and how to see all, and why nothing came', async () => {
    const { served } = serve({ plates: [] });
    open('guest', '?view=table&health=retired');
    expect(await screen.findByText(/No plate is found by that/)).toBeDefined();
    expect(screen.getByRole('link', { name: 'See every plate in use' })).toBeDefined();
    cleanup();
    served.special = ({ path }) => (path.startsWith('/plates') ? problem(500, 'The server failed.') : null);
    open('guest', '?view=table');
    expect((await screen.findByRole('alert')).textContent).toMatch(
      /Nothing came of the plates.*The server failed/,
    );
  });
});

describe('the address of the table', () => {
  it('is read back as it was written, and holds nothing that is usual', () => {
    const usual = readTableView(new URLSearchParams('view=table'));
    expect(tableAddress(cabinet, usual)).toBe(`${cabinet}?view=table`);
    const view = { search: 'a&b', health: 'due', kind: 'half', sort: 'age', order: 'desc' } as const;
    expect(readTableView(new URLSearchParams(tableAddress(cabinet, view).split('?')[1]))).toEqual(view);
  });

  it('falls back to the usual where it says what there is not', () => {
    expect(readTableView(new URLSearchParams('health=fine&kind=third&sort=colour&order=up'))).toEqual({
      search: '',
      health: 'in-use',
      kind: null,
      sort: 'name',
      order: 'asc',
    });
  });
});

describe('the list of mounts', () => {
  it('is searched, filtered and sorted by the server, as its address says', async () => {
    const { calls } = serve({ mounts: [mountFixture()] });
    const press = open('guest', '/mounts?state=empty&drive=motor&sort=repeatability&search=M');
    await screen.findByRole('link', { name: 'M13' });
    expect(calls.find(({ path }) => path.startsWith('/mounts?'))?.path).toBe(
      '/mounts?search=M&state=empty&drive=motor&sort=repeatability&order=asc&limit=50',
    );
    await press.click(screen.getByRole('link', { name: 'retired' }));
    expect(address()).toBe('/mounts?search=M&state=retired&drive=motor&sort=repeatability');
    expect(screen.queryByRole('link', { name: 'Add a mount' })).toBeNull();
  });
});
