import { QueryClient, QueryClientProvider } from '@tanstack/react-query';
import { cleanup, render, screen } from '@testing-library/react';
import { MemoryRouter, Route, Routes } from 'react-router-dom';
import { afterEach, beforeEach, describe, expect, it, vi } from 'vitest';
import type { Role } from '../../../shared/permissions';
import { Component as CabinetPage } from '../../../src/features/cabinet/CabinetPage';
import { LabContext } from '../../../src/features/labs';
import { plateFixture } from './plate-fixture';

const lab = {
  id: '0190a000-0000-7000-8000-0000000000aa',
  name: 'Tern Street quantum optics',
  convention: { phase: 'kz-wt', handedness: 'receiver', s3Sign: 'L' },
  calibrationDueDays: 90,
} as const;
const user = { id: '0190a000-0000-7000-8000-0000000000bb', name: 'Adaeze Holm', login: 'aholm', email: null };
const plate = plateFixture();

beforeEach(() => {
  vi.stubGlobal('fetch', (url: string) => {
    const answer = url.endsWith('/plates')
      ? { items: [plate] }
      : { plate, calibrations: [plate.calibration] };
    return Promise.resolve(new Response(JSON.stringify(answer), { status: 200 }));
  });
});
afterEach(() => {
  cleanup();
  vi.unstubAllGlobals();
});

async function open(role: Role, rest: string) {
  const queryClient = new QueryClient({ defaultOptions: { queries: { retry: false } } });
  render(
    <QueryClientProvider client={queryClient}>
      <MemoryRouter initialEntries={[`/cabinet${rest}`]}>
        <LabContext value={{ lab, user, member: { userId: user.id, labId: lab.id, role } }}>
          <Routes>
            <Route path="/cabinet/:plateId?" element={<CabinetPage />} />
          </Routes>
        </LabContext>
      </MemoryRouter>
    </QueryClientProvider>,
  );
  await screen.findByRole('heading', { name: 'Cabinet' });
}

describe('a task of the cabinet that is opened by its address', () => {
  it.each([
    ['guest', '?do=add', 'Plates are added by designers and leads'],
    ['operator', '?do=add', 'Plates are added by designers and leads'],
    ['guest', '?do=calibrate', 'Calibrations are recorded by operators, designers and leads'],
    ['guest', `/${plate.id}?do=calibrate`, 'Calibrations are recorded by operators, designers and leads'],
    ['operator', `/${plate.id}?do=edit`, 'Plates are edited by designers and leads'],
  ] as const)('says to role %s at %s who may do it, over the cabinet', async (role, rest, sentence) => {
    await open(role, rest);
    expect(screen.getByRole('alert').textContent).toContain(sentence);
    expect(await screen.findByRole('article', { name: 'Q-B' })).toBeDefined();
    expect(screen.queryByRole('button', { name: /Add the plate|Record the calibration/ })).toBeNull();
  });

  it('refuses nothing to those who may, and nothing where no task is asked for', async () => {
    await open('operator', `/${plate.id}?do=calibrate`);
    expect(await screen.findByRole('button', { name: 'Record the calibration' })).toBeDefined();
    expect(screen.queryByText(/Ask the lab/)).toBeNull();
    cleanup();
    await open('guest', '');
    expect(screen.queryByText(/Ask the lab/)).toBeNull();
  });
});
