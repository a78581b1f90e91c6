import { QueryClient, QueryClientProvider } from '@tanstack/react-query';
import { cleanup, render, screen, within } from '@testing-library/react';
import userEvent from '@testing-library/user-event';
import { MemoryRouter } from 'react-router-dom';
import { afterEach, beforeEach, describe, expect, it, vi } from 'vitest';
import type { Role } from '../../../shared/permissions';
import { LabContext } from '../../../src/features/labs';
import { Component as LabPage } from '../../../src/features/labs/LabPage';

const lab = {
  id: '0190a000-0000-7000-8000-0000000000aa',
  name: 'Tern Street quantum optics',
  convention: { phase: 'kz-wt', handedness: 'receiver', s3Sign: 'L' },
  calibrationDueDays: 90,
} as const;
const user = { id: '0190a000-0000-7000-8000-0000000000bb', name: 'Adaeze Holm', login: 'aholm', email: null };
const members = [
  { userId: user.id, name: user.name, login: user.login, role: 'lead', joinedAt: '2025-01-01T00:00:00.000Z' },
  {
    userId: '0190a000-0000-7000-8000-0000000000cc',
    name: 'Juno Petrak',
    login: 'jpetrak',
    role: 'operator',
    joinedAt: '2025-02-01T00:00:00.000Z',
  },
];

interface Call {
  readonly method: string;
  readonly url: string;
  readonly body: string;
}
let calls: Call[] = [];

/** The server, as far as this page asks it. */
function answer(url: string): unknown {
  if (url.endsWith('/members')) return { items: members };
  if (url.endsWith('/invitations')) return { items: [] };
  return lab;
}

beforeEach(() => {
  calls = [];
  vi.stubGlobal('fetch', (url: string, init: RequestInit) => {
    calls.push({ method: init.method ?? 'GET', url, body: typeof init.body === 'string' ? init.body : '' });
    return Promise.resolve(new Response(JSON.stringify(answer(url)), { status: 200 }));
  });
});
afterEach(() => {
  cleanup();
  vi.unstubAllGlobals();
});

function open(role: Role) {
  const queryClient = new QueryClient({ defaultOptions: { queries: { retry: false } } });
  render(
    <QueryClientProvider client={queryClient}>
      <MemoryRouter>
        <LabContext value={{ lab, user, member: { userId: user.id, labId: lab.id, role } }}>
          <LabPage />
        </LabContext>
      </MemoryRouter>
    </QueryClientProvider>,
  );
  return userEvent.setup();
}

describe('the lab page', () => {
  it('lets a lead change another role, and keeps the only lead one', async () => {
    const press = open('lead');
    await press.selectOptions(
      await screen.findByRole('combobox', { name: 'Role of Juno Petrak' }),
      'designer',
    );
    expect(calls.find(({ method }) => method === 'PATCH')).toMatchObject({
      url: `/api/v1/labs/${lab.id}/members/${members[1]?.userId ?? ''}`,
      body: '{"role":"designer"}',
    });
    expect(screen.queryByRole('combobox', { name: 'Role of Adaeze Holm' })).toBeNull();
    expect(screen.getByText(/The only one: make another lead/)).toBeDefined();
  });

  it('shows others who belongs to the lab, and nothing to press', async () => {
    open('designer');
    expect(await screen.findByText('Juno Petrak')).toBeDefined();
    expect(screen.queryByRole('combobox')).toBeNull();
    expect(screen.queryByRole('button', { name: /Take out/ })).toBeNull();
    expect(screen.queryByRole('region', { name: 'Invitations' })).toBeNull();
    expect(
      within(screen.getByRole('group', { name: 'phase' })).getByRole('radio', { name: 'kz − ωt' }),
    ).toHaveProperty('disabled', false);
    expect(screen.getByRole('group', { name: 'phase' })).toHaveProperty('disabled', true);
    expect(calls.some(({ url }) => url.endsWith('/invitations'))).toBe(false);
  });

  it('shows what a change of convention does to one state before it is saved', async () => {
    const press = open('lead');
    const example = () => screen.getByText(/turns/).textContent;
    expect(example()).toMatch(/turns counter-clockwise.*called L.*S3 is written \+1/);
    await press.click(screen.getByRole('radio', { name: 'ωt − kz' }));
    expect(example()).toMatch(/turns clockwise.*called R.*S3 is written \u22121/);
    expect(screen.getByText(/can be read is rewritten, so that the light stays the same/)).toBeDefined();
    expect(calls.some(({ method }) => method === 'PATCH')).toBe(false);
    await press.click(screen.getByRole('button', { name: 'Save the convention' }));
    expect(calls.find(({ method }) => method === 'PATCH')?.body).toBe(
      '{"convention":{"phase":"wt-kz","handedness":"receiver","s3Sign":"L"}}',
    );
  });

  it('says what is wrong with a due time that is no number of days', async () => {
    const press = open('lead');
    const days = screen.getByLabelText('days until a calibration is due');
    await press.clear(days);
    await press.type(days, '0');
    await press.click(screen.getByRole('button', { name: /Save the settings/ }));
    expect(await screen.findByText('A calibration falls due after 1 to 3650 days.')).toBeDefined();
    expect(calls.some(({ method }) => method === 'PATCH')).toBe(false);
  });
});
