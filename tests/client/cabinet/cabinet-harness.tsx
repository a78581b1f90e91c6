import { QueryClient, QueryClientProvider } from '@tanstack/react-query';
import { configure, render, screen } from '@testing-library/react';
import userEvent from '@testing-library/user-event';
import { createMemoryRouter, Outlet, RouterProvider, useLocation } from 'react-router-dom';
import { vi } from 'vitest';
import type { Role } from '../../../shared/permissions';
import type { CabinetCounts, CabinetPlate, PlateDetail } from '../../../shared/schemas/cabinet';
import type { CabinetMount } from '../../../shared/schemas/mounts';
import { Component as CabinetPage } from '../../../src/features/cabinet/CabinetPage';
import { Component as MountPage } from '../../../src/features/cabinet/mounts/MountPage';
import { Component as MountsPage } from '../../../src/features/cabinet/mounts/MountsPage';
import { LabContext } from '../../../src/features/labs';

// A whole page is drawn: on a busy machine that takes longer than the usual second.
configure({ asyncUtilTimeout: 5000 });

export const lab = {
  id: '0190a000-0000-7000-8000-0000000000aa',
  name: 'Tern Street quantum optics',
  convention: { phase: 'kz-wt', handedness: 'receiver', s3Sign: 'L' },
  calibrationDueDays: 90,
} as const;
const user = { id: '0190a000-0000-7000-8000-0000000000bb', name: 'Adaeze Holm', login: 'aholm', email: null };
export const cabinet = `/labs/${lab.id}/cabinet`;

/** A request that a page made. */
export interface Call {
  readonly method: string;
  /** After the lab, with its query. */
  readonly path: string;
  readonly body: unknown;
  readonly ifMatch: string | null;
}

/** What the server holds and how it answers; a test changes it as it goes. */
export interface Served {
  plates: readonly CabinetPlate[];
  detail: PlateDetail | null;
  mounts: readonly CabinetMount[];
  counts: CabinetCounts;
  /** Answers before anything else; null leaves it to the rest. */
  special: (call: Call) => { readonly status: number; readonly body: unknown } | null;
}

const none = {
  calibrated: 0,
  due: 0,
  overdue: 0,
  'open-question': 0,
  'not-calibrated': 0,
  'not-seated': 0,
  retired: 0,
};
export const counts: CabinetCounts = {
  plates: { ...none, calibrated: 1 },
  kinds: { half: none, quarter: { ...none, calibrated: 1 }, other: none },
  openAxes: 0,
  mounts: 2,
};

export function problem(status: number, detail: string, more: object = {}) {
  return {
    status,
    body: { type: 'urn:x', title: 'Refused', status, detail, requestId: 'r', ...more },
  };
}

function usual(served: Served, { path }: Call): unknown {
  const [where = ''] = path.split('?');
  if (where === '/cabinet') return served.counts;
  if (where === '/plates') return { items: served.plates, nextCursor: null };
  if (where === '/mounts') return { items: served.mounts, nextCursor: null };
  if (where.endsWith('/reliance')) return { benches: [], drafts: [], versions: [] };
  if (where.startsWith('/mounts/')) return { mount: served.mounts[0], seats: [] };
  return served.detail;
}

/** Stands in for the server: every call is kept, and answered from `served`. */
export function serve(start: Partial<Served> = {}): { readonly served: Served; readonly calls: Call[] } {
  const served: Served = { plates: [], detail: null, mounts: [], counts, special: () => null, ...start };
  const calls: Call[] = [];
  vi.stubGlobal('fetch', (url: string, init: RequestInit = {}) => {
    const headers = new Headers(init.headers);
    const call: Call = {
      method: init.method ?? 'GET',
      path: url.replace(`/api/v1/labs/${lab.id}`, ''),
      body: typeof init.body === 'string' ? JSON.parse(init.body) : null,
      ifMatch: headers.get('if-match'),
    };
    calls.push(call);
    const answer = served.special(call) ?? { status: 200, body: usual(served, call) };
    return Promise.resolve(new Response(JSON.stringify(answer.body), { status: answer.status }));
  });
  return { served, calls };
}

/** The writes among the calls. */
export const writes = (calls: readonly Call[]): readonly Call[] =>
  calls.filter(({ method }) => method !== 'GET');

function Address() {
  const { pathname, search } = useLocation();
  return <output aria-label="address">{`${pathname}${search}`.replace(cabinet, '')}</output>;
}

/** Where the page is now, after the cabinet's own address. */
export const address = (): string => screen.getByLabelText('address').textContent;

/** Opens a page of the cabinet as somebody of this role. */
export function open(role: Role, rest = '') {
  const queryClient = new QueryClient({ defaultOptions: { queries: { retry: false } } });
  const router = createMemoryRouter(
    [
      {
        element: (
          <LabContext value={{ lab, user, member: { userId: user.id, labId: lab.id, role } }}>
            <Outlet />
            <Address />
          </LabContext>
        ),
        children: [
          { path: `${cabinet}/mounts`, Component: MountsPage },
          { path: `${cabinet}/mounts/:mountId`, Component: MountPage },
          { path: `${cabinet}/:plateId?`, Component: CabinetPage },
        ],
      },
    ],
    { initialEntries: [`${cabinet}${rest}`] },
  );
  render(
    <QueryClientProvider client={queryClient}>
      <RouterProvider router={router} />
    </QueryClientProvider>,
  );
  return userEvent.setup();
}
