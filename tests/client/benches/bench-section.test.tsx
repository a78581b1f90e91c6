import { QueryClientProvider } from '@tanstack/react-query';
import { cleanup, render, screen, within } from '@testing-library/react';
import { MemoryRouter } from 'react-router-dom';
import { afterEach, describe, expect, it, vi } from 'vitest';
import type { Bench } from '../../../shared/schemas/benches';
import type { CabinetPlate } from '../../../shared/schemas/cabinet';
import { benchLabel } from '../../../src/features/benches';
import { BenchSection } from '../../../src/features/benches/BenchSection';
import { LabContext } from '../../../src/features/labs';
import { createQueryClient } from '../../../src/lib/query-client';
import { bench as anyBench, cabinetPlate, id, lab, now, order } from './fixture';

afterEach(() => {
  cleanup();
  vi.unstubAllGlobals();
});

function open(bench: Bench, plates: readonly CabinetPlate[]) {
  vi.stubGlobal('fetch', () =>
    Promise.resolve(new Response(JSON.stringify({ items: plates }), { status: 200 })),
  );
  render(
    <QueryClientProvider client={createQueryClient()}>
      <MemoryRouter>
        <LabContext value={lab}>
          <BenchSection bench={bench} now={now} />
        </LabContext>
      </MemoryRouter>
    </QueryClientProvider>,
  );
}

const h1 = cabinetPlate(1, 'H-1');
const h4 = cabinetPlate(3, 'H-4');
const out = cabinetPlate(2, 'Q-1', { seat: null, calibration: null, health: 'not-seated' });
const waiting = anyBench({
  order: [...order('preparation', h1, out), ...order('analysis', h4)],
  notReady: [{ plateId: out.id, name: 'Q-1', part: 'preparation', why: 'not-seated' }],
  detectors: {
    passed: { name: 'APD 1', darkRatePerS: 120 },
    rejected: { name: 'APD 2', darkRatePerS: 95 },
    efficiencyRatio: null,
  },
});

describe('a bench that is looked at', () => {
  it('shows its whole beam as the light goes, from source to detectors', async () => {
    open(waiting, [h1, out, h4]);
    await screen.findAllByText(/179\.2\(3\)°/);
    const beam = screen.getByRole('list', { name: 'The beam of signal arm, as light goes' });
    const words = within(beam)
      .getAllByRole('listitem')
      .map(({ textContent }) => textContent);
    expect(words).toHaveLength(6);
    for (const [place, part] of [
      /source, 810nm/,
      /^polariser/,
      /^preparationH-1/,
      /^Q-1.*not seated/,
      /^analysisH-4/,
      /^analysing polariser.*passed APD 1, dark 120per second.*rejected APD 2.*rejected over passed not measured/,
    ].entries()) {
      expect(words[place]).toMatch(part);
    }
  });

  it('names its plates before anything else is known of them', () => {
    open(waiting, []);
    expect(screen.getByRole('link', { name: 'H-4' })).toBeDefined();
  });

  it('says which plate it waits for and why, with the way to it', async () => {
    open(waiting, [h1, out, h4]);
    const waits = screen.getByRole('list', { name: 'What signal arm waits for' });
    expect(waits.textContent).toContain(
      'Q-1 sits in no mount. Seat it and calibrate it, then signal arm can be used again.',
    );
    expect(within(waits).getByRole('link', { name: 'See Q-1' }).getAttribute('href')).toBe(
      `/labs/${lab.lab.id}/cabinet/${out.id}`,
    );
    await screen.findAllByText(/179\.2\(3\)°/);
    // Once, not again among what is to be known of its plates.
    expect(screen.getAllByText(/sits in no mount/)).toHaveLength(1);
  });

  it('has no analysing polariser where nothing analyses or counts', () => {
    open(anyBench({ order: order('preparation', h1) }), [h1]);
    expect(screen.queryByText('analysing polariser')).toBeNull();
  });
});

it('is offered by what it waits for as long as it waits', () => {
  expect(benchLabel(waiting)).toBe('signal arm: waits for Q-1');
  const analysisWaits: Bench['notReady'] = [
    { plateId: id(3), name: 'H-4', part: 'analysis', why: 'not-calibrated' },
  ];
  expect(benchLabel({ name: 'signal arm', plates: [], notReady: analysisWaits })).toBe('signal arm: ');
});
