import { QueryClient, QueryClientProvider } from '@tanstack/react-query';
import { act, cleanup, renderHook } from '@testing-library/react';
import type { ReactNode } from 'react';
import { afterEach, beforeEach, describe, expect, it, vi } from 'vitest';
import { type Draft, draftContentSchema, type Protocol } from '../../../shared/schemas/protocols';
import { rename } from '../../../src/features/protocols/draft-edits';
import { useDraft } from '../../../src/features/protocols/use-draft';

const labId = '0193a000-0000-7000-8000-00000000000a';
const userId = '0193a000-0000-7000-8000-00000000000b';
const quietMs = 700;
const retryMs = 5_100;

const draft: Draft = {
  revision: 4,
  content: {
    name: 'Compass points',
    purpose: '',
    kind: 'prepare',
    benchId: '0193a000-0000-7000-8000-0000000000b0',
    objective: 'least-expected-infidelity',
    presentDialsDeg: null,
    toleranceInfidelity: 1e-3,
    targets: [
      { id: '0193a000-0000-7000-8000-000000000001', label: 't0', expression: 'H', heldFastAxesDeg: null },
    ],
  },
  savedAt: '2026-11-30T10:00:00.000Z',
  savedBy: 'Ines Varga',
};
const protocol: Protocol = { id: '0193a000-0000-7000-8000-0000000000c0', draft, latestVersion: null };

interface Call {
  readonly ifMatch: string | null;
  readonly name: string;
}

/** A server that keeps one draft; `loseAnswer` makes the next save arrive and its answer not. */
function serve(options: { loseAnswer?: boolean; refuseWith?: number } = {}) {
  const calls: Call[] = [];
  let stored = draft;
  let lose = options.loseAnswer ?? false;
  vi.stubGlobal('fetch', (_path: string, init: RequestInit) => {
    if (init.method !== 'PUT') return Promise.resolve(new Response('{}', { status: 404 }));
    const content = draftContentSchema.parse(JSON.parse(typeof init.body === 'string' ? init.body : ''));
    const ifMatch = new Headers(init.headers).get('if-match');
    calls.push({ ifMatch, name: content.name });
    if (options.refuseWith !== undefined) return Promise.resolve(problem(options.refuseWith, undefined));
    if (ifMatch !== `"r${stored.revision}"`) return Promise.resolve(problem(412, stored));
    stored = { ...stored, revision: stored.revision + 1, content };
    if (lose) {
      lose = false;
      return Promise.reject(new TypeError('Failed to fetch'));
    }
    return Promise.resolve(new Response(JSON.stringify(stored)));
  });
  return { calls };
}

function problem(status: number, current: unknown): Response {
  const body = {
    type: 'urn:quarterturn:problem:x',
    title: 'x',
    status,
    detail: 'No.',
    requestId: 'r',
    current,
  };
  return new Response(JSON.stringify(body), { status });
}

function open() {
  const client = new QueryClient();
  const wrapper = ({ children }: { children: ReactNode }) => (
    <QueryClientProvider client={client}>{children}</QueryClientProvider>
  );
  return renderHook(() => useDraft(labId, userId, protocol, true), { wrapper });
}

const pass = (ms: number) => act(() => vi.advanceTimersByTimeAsync(ms));

beforeEach(() => {
  vi.useFakeTimers();
  localStorage.clear();
});
afterEach(() => {
  cleanup();
  vi.useRealTimers();
  vi.unstubAllGlobals();
});

describe('a draft that saves itself', () => {
  it('saves once, a moment after the last key', async () => {
    const { calls } = serve();
    const { result } = open();
    act(() => result.current.edit(rename('Compass')));
    act(() => result.current.edit(rename('Compass rose')));
    expect(result.current.saving.state).toBe('typed');
    await pass(quietMs);
    expect(calls).toEqual([{ ifMatch: '"r4"', name: 'Compass rose' }]);
    expect(result.current.saving.state).toBe('saved');
  });

  it('does not save for ever when a name ends with a space', async () => {
    const { calls } = serve();
    const { result } = open();
    act(() => result.current.edit(rename('Compass ')));
    for (let turn = 0; turn < 5; turn += 1) await pass(quietMs);
    expect(calls).toHaveLength(1);
    expect(result.current.content.name).toBe('Compass ');
  });

  it('knows its own save again when the answer to it was lost', async () => {
    const { calls } = serve({ loseAnswer: true });
    const { result } = open();
    act(() => result.current.edit(rename('Compass rose')));
    await pass(quietMs);
    expect(result.current.saving.state).toBe('kept');
    await pass(retryMs);
    await pass(quietMs);
    expect(calls).toHaveLength(2);
    expect(result.current.conflict).toBeNull();
    expect(result.current.saving.state).toBe('saved');
  });

  it('tries a refused save once, not for ever', async () => {
    const { calls } = serve({ refuseWith: 403 });
    const { result } = open();
    act(() => result.current.edit(rename('Compass rose')));
    for (let turn = 0; turn < 5; turn += 1) await pass(retryMs);
    expect(calls).toHaveLength(1);
    expect(result.current.saving).toEqual({ state: 'kept', reason: 'No.' });
  });

  it('sends the last keys when the page is left before the moment is over', async () => {
    const { calls } = serve();
    const { result, unmount } = open();
    act(() => result.current.edit(rename('Compass rose')));
    unmount();
    await pass(0);
    expect(calls.map(({ name }) => name)).toEqual(['Compass rose']);
  });

  it('shows what somebody else saved, and overwrites nothing until the person decides', async () => {
    const { calls } = serve();
    const first = open();
    const second = open();
    act(() => first.result.current.edit(rename('Mine')));
    await pass(quietMs);
    act(() => second.result.current.edit(rename('Theirs')));
    await pass(quietMs);
    expect(second.result.current.conflict?.content.name).toBe('Mine');
    for (let turn = 0; turn < 3; turn += 1) await pass(retryMs);
    expect(calls).toHaveLength(2);
    act(() => second.result.current.keepMine());
    await pass(quietMs);
    expect(calls.at(-1)).toEqual({ ifMatch: '"r5"', name: 'Theirs' });
  });
});
