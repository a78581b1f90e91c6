import { QueryClientProvider } from '@tanstack/react-query';
import { render } from '@testing-library/react';
import userEvent from '@testing-library/user-event';
import { createMemoryRouter, Outlet, RouterProvider } from 'react-router-dom';
import { vi } from 'vitest';
import { z } from 'zod';
import { LabContext, type LabContextValue } from '../../../src/features/labs/lab-context';
import { RunPage } from '../../../src/features/runs/RunPage';
import { StartRunPage } from '../../../src/features/runs/StartRunPage';
import { createQueryClient } from '../../../src/lib/query-client';
import { pauseRunSchema, type Reading, recordReadingSchema, type Run } from '../../../shared/schemas/runs';
import type { VersionSummary } from '../../../shared/schemas/protocols';
import type { Bench } from '../../../shared/schemas/benches';
import type { Version } from '../../../shared/schemas/versions';
import { id, labId, runId } from './fixture';

/** One request that reached the fake of the API. */
interface Asked {
  readonly path: string;
  readonly method: string;
  readonly key: string | null;
  readonly body: unknown;
}

const json = (value: unknown, status = 200) =>
  new Response(JSON.stringify(value), { status, headers: { 'content-type': 'application/json' } });

/** Answers like the server for one run and its version: HTTP is where these tests stop. */
export class FakeApi {
  readonly asked: Asked[] = [];
  /** What the next writes meet; null lets them through. */
  failWith: 'network' | 'silence' | { readonly status: number; readonly detail: string } | null = null;
  /** What became of the bench since the version, besides its second plate's new calibration. */
  changeBench: (bench: Bench) => Bench = (bench) => bench;
  /** Versions that were saved after the one that is run, newest first. */
  newer: readonly VersionSummary[] = [];
  /** While it waits for this, the bench is not answered. */
  benchAfter: Promise<void> = Promise.resolve();
  constructor(
    public run: Run,
    readonly version: Version,
  ) {}

  private readonly seen = new Map<string, string>();

  readonly fetch = (input: unknown, init: RequestInit = {}): Promise<Response> => {
    const path = z.string().parse(input).replace('/api/v1', '');
    const method = init.method ?? 'GET';
    const key = new Headers(init.headers).get('idempotency-key');
    const body: unknown = typeof init.body === 'string' ? JSON.parse(init.body) : null;
    this.asked.push({ path, method, key, body });
    const { signal } = init;
    if (method === 'POST' && this.failWith === 'silence') {
      return new Promise((_, reject) => {
        signal?.addEventListener('abort', () => reject(new DOMException('No answer.', 'TimeoutError')));
      });
    }
    const ready = path.includes('/benches/') ? this.benchAfter : Promise.resolve();
    return ready.then(() => this.answer(path, method, key, body));
  };

  posts(ending: string): Asked[] {
    return this.asked.filter(({ path, method }) => method === 'POST' && path.endsWith(ending));
  }

  private answer(path: string, method: string, key: string | null, body: unknown): Response {
    if (method === 'POST') {
      if (this.failWith === 'network') throw new TypeError('Failed to fetch');
      if (this.failWith !== null && this.failWith !== 'silence') {
        const { status, detail } = this.failWith;
        return json({ type: 'about:blank', title: 'Refused', status, detail, requestId: 'r1' }, status);
      }
      this.write(path, key, body);
      return json(this.run);
    }
    if (path.includes('/runs/')) return json(this.run);
    if (/\/versions\/\d+$/u.test(path)) return json(this.version);
    if (path.includes('/versions'))
      return json({ items: [...this.newer, this.version.summary], nextCursor: null });
    if (path.includes('/benches/')) return json(this.changeBench(this.bench()));
    return json(
      { type: 'about:blank', title: 'Not found', status: 404, detail: 'No such thing.', requestId: 'r2' },
      404,
    );
  }

  /** The bench as it stands now, its second plate calibrated anew since the version. */
  private bench(): Bench {
    const { bench } = this.version.content;
    return {
      id: bench.id,
      name: bench.name,
      wavelengthNm: bench.wavelengthNm,
      wavelengthSigmaNm: bench.wavelengthSigmaNm,
      temperatureC: bench.temperatureC,
      temperatureSigmaK: bench.temperatureSigmaK,
      inputExpression: bench.input.expression,
      polariserSigmaDeg: bench.input.polariserSigmaDeg,
      polariserExtinction: bench.input.polariserExtinction,
      laserClass: bench.laserClass,
      hazardWavelengthsNm: bench.hazardWavelengthsNm,
      plates: bench.plates.map((plate, index) => ({
        ...plate,
        note: '',
        seatedAt: '2026-01-01T00:00:00Z',
        retiredAt: null,
        benches: [],
        revision: 1,
        calibration: { ...plate.calibration, ...(index === 1 ? { id: id(777) } : {}) },
      })),
      analysisPlates: [],
      order: bench.plates.map(({ id: plateId, name }) => ({ plateId, name, part: 'preparation' })),
      notReady: [],
      detectors: { passed: null, rejected: null, efficiencyRatio: null },
      retiredAt: null,
      revision: 1,
    };
  }

  private write(path: string, key: string | null, body: unknown): void {
    const state = (change: Partial<Run['summary']>) => {
      this.run = { ...this.run, summary: { ...this.run.summary, ...change } };
    };
    if (path.endsWith('/pause')) state({ state: 'paused', pauseNote: pauseRunSchema.parse(body).note });
    if (path.endsWith('/resume')) state({ state: 'running', pauseNote: '' });
    if (path.endsWith('/finish')) state({ state: 'finished', finishedAt: '2026-11-30T10:00:00.000Z' });
    if (path.endsWith('/readings') && key !== null && !this.seen.has(key)) {
      this.seen.set(key, path);
      const read = recordReadingSchema.parse(body);
      const reading: Reading = {
        id: id(900 + this.run.readings.length),
        sequence: this.run.readings.length + 1,
        settingIndex: read.settingIndex,
        outcome: read.outcome,
        dialledDeg: read.outcome === 'done' ? read.dialledDeg : [],
        note: read.note,
        recordedAt: '2026-11-30T09:30:00.000Z',
        recordedBy: 'Jonas Brandt',
      };
      this.run = { ...this.run, readings: [...this.run.readings, reading] };
    }
  }
}

export type TestRole = LabContextValue['member']['role'];

/** Opens one page of the bench over the fake API. */
export function openBench(api: FakeApi, options: { role?: TestRole; path?: string } = {}) {
  const { role = 'operator', path = `/labs/${labId}/bench/runs/${runId}` } = options;
  vi.stubGlobal('fetch', api.fetch);
  const lab: LabContextValue = {
    lab: {
      id: labId,
      name: 'Harbour Street photonics',
      convention: api.version.content.convention,
      calibrationDueDays: 90,
    },
    user: { id: id(3), name: 'Jonas Brandt', login: 'jonas', email: null },
    member: { userId: id(3), labId, role },
  };
  const router = createMemoryRouter(
    [
      {
        element: (
          <LabContext.Provider value={lab}>
            <Outlet />
          </LabContext.Provider>
        ),
        children: [
          { path: '/labs/:labId/bench/runs/:runId', element: <RunPage /> },
          { path: '/labs/:labId/bench/start', element: <StartRunPage /> },
          { path: '*', element: <p>another page</p> },
        ],
      },
    ],
    { initialEntries: [path] },
  );
  const view = render(
    <QueryClientProvider client={createQueryClient()}>
      <RouterProvider router={router} />
    </QueryClientProvider>,
  );
  return { ...view, router, user: userEvent.setup() };
}
