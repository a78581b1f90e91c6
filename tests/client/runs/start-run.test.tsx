// @vitest-environment jsdom
import { cleanup, screen, waitFor } from '@testing-library/react';
import { afterEach, beforeEach, describe, expect, test, vi } from 'vitest';
import { startRunSchema } from '../../../shared/schemas/runs';
import type { Version } from '../../../shared/schemas/versions';
import { FakeApi, openBench } from './bench-harness';
import { id, labId, makeRun, makeVersion } from './fixture';

const version = makeVersion();
const path = `/labs/${labId}/bench/start?protocolId=${version.summary.protocolId}&number=${version.summary.number}`;

beforeEach(() => {
  localStorage.clear();
});
afterEach(() => {
  cleanup();
  vi.unstubAllGlobals();
});

describe('the start of a run', () => {
  test('says that nobody reviewed the version, and which plate was calibrated anew since', async () => {
    openBench(new FakeApi(makeRun(version), version), { path });
    expect(
      await screen.findByText('Version 14 is saved, not released: nobody has reviewed it.'),
    ).toBeTruthy();
    expect(await screen.findByText(/^Q-B has a newer calibration/u)).toBeTruthy();
    expect(screen.queryByText(/^H-3 has a newer calibration/u)).toBeNull();
  });

  test('says which version is the newest where an older one is run, and leads to it', async () => {
    const api = new FakeApi(makeRun(version), version);
    api.newer = [{ ...version.summary, id: id(880), number: 16 }];
    openBench(api, { path });
    expect(await screen.findByText(/^Version 16 of this protocol is newer/u)).toBeTruthy();
    const link = screen.getByRole('link', { name: 'Run version 16' });
    expect(link.getAttribute('href')).toBe(path.replace('number=14', 'number=16'));
    cleanup();
    openBench(new FakeApi(makeRun(version), version), { path });
    await screen.findByText(/^Q-B has a newer calibration/u);
    expect(screen.queryByRole('link', { name: /^Run version/u })).toBeNull();
  });

  test('marks the older versions of a protocol in the list', async () => {
    const api = new FakeApi(makeRun(version), version);
    api.newer = [{ ...version.summary, id: id(880), number: 16 }];
    openBench(api, { path: `/labs/${labId}/bench/start` });
    await screen.findByRole('link', { name: /version 14$/u });
    const rows = screen.getAllByRole('row').map(({ textContent }) => textContent);
    expect(rows.filter((row) => row.includes('version 16 is newer'))).toHaveLength(1);
    expect(rows.at(-1)).toContain('version 14version 16 is newer');
  });

  test('finds its version by protocol and number with no list, and by its id among the newest', async () => {
    const api = new FakeApi(makeRun(version), version);
    openBench(api, { path });
    expect(await screen.findByRole('heading', { name: /version 14, at heralded bench/u })).toBeTruthy();
    expect(api.asked.some(({ path: asked }) => asked.includes('/versions?'))).toBe(false);
    cleanup();
    openBench(api, { path: `/labs/${labId}/bench/start?versionId=${version.summary.id}` });
    expect(await screen.findByRole('heading', { name: /version 14, at heralded bench/u })).toBeTruthy();
  });

  test('is held back until the bench’s present state is known', async () => {
    const api = new FakeApi(makeRun(version), version);
    let answered: () => void = () => undefined;
    api.benchAfter = new Promise((resolve) => {
      answered = resolve;
    });
    const { user } = openBench(api, { path });
    await user.click(await screen.findByRole('checkbox'));
    await user.click(
      screen.getByRole('button', { name: /^Start the run ?, waits: the bench’s present state$/u }),
    );
    await user.type(screen.getByRole('textbox', { name: 'H-3 says, degrees' }), '83.5{Enter}');
    expect(api.posts('/runs')).toHaveLength(0);
    answered();
    await user.click(await screen.findByRole('button', { name: 'Start the run' }));
    await waitFor(() => expect(api.posts('/runs')).toHaveLength(1));
  });

  test('names a mount whose numbers now run the other way, a retired bench and another wavelength', async () => {
    const api = new FakeApi(makeRun(version), version);
    api.changeBench = (bench) => ({
      ...bench,
      wavelengthNm: 808,
      retiredAt: '2026-11-29T09:00:00.000Z',
      plates: bench.plates.map((plate) => ({
        ...plate,
        mount: { ...plate.mount, direction: -1, resolutionDeg: plate.name === 'H-3' ? 0.5 : 0.1 },
      })),
    });
    openBench(api, { path });
    expect(
      await screen.findByText(/^The numbers of H-3’s mount now rise when it is turned clockwise/u),
    ).toBeTruthy();
    // Q-B's numbers rose clockwise already.
    expect(screen.queryByText(/^The numbers of Q-B/u)).toBeNull();
    expect(screen.getByText(/^The finest step of H-3’s dial is now 0.5°/u)).toBeTruthy();
    expect(screen.getByText(/^heralded bench was retired on 29 November 2026/u)).toBeTruthy();
    expect(screen.getByText(/^heralded bench now works at 808/u)).toBeTruthy();
  });

  test('compares the light that goes in, not how it is written', async () => {
    const api = new FakeApi(makeRun(version), version);
    api.changeBench = (bench) => ({ ...bench, inputExpression: 'stokes(1, 0, 0)' });
    openBench(api, { path });
    await screen.findByRole('button', { name: 'Start the run' });
    expect(screen.queryByText(/^The input of/u)).toBeNull();
    cleanup();
    api.changeBench = (bench) => ({ ...bench, inputExpression: 'linear(2deg)' });
    openBench(api, { path });
    expect(await screen.findByText(/^The input of heralded bench is now linear\(2deg\)/u)).toBeTruthy();
  });

  test('says which plate was frozen with a calibration of another wavelength', async () => {
    const elsewhere: Version = {
      ...version,
      content: {
        ...version.content,
        bench: {
          ...version.content.bench,
          wavelengthNm: 780,
          plates: version.content.bench.plates.map((plate) => ({
            ...plate,
            used: { ...plate.used, source: 'model', retardanceDeg: 186.65, shiftDeg: 7.35 },
          })),
        },
      },
    };
    openBench(new FakeApi(makeRun(elsewhere), elsewhere), { path });
    expect(
      await screen.findByText(/^H-3 was calibrated at 810.nm\. At 780.nm it is taken as 186\.65°/u),
    ).toBeTruthy();
  });

  test('shows the caution in full and starts nothing before it is acknowledged', async () => {
    const api = new FakeApi(makeRun(version), version);
    const { user } = openBench(api, { path });
    expect(await screen.findByText(/Wear eyewear made for 405 and 810/u)).toBeTruthy();
    expect(screen.getByText(/IEC 60825-1/u)).toBeTruthy();
    await user.click(await screen.findByRole('button', { name: 'Start the run' }));
    expect(screen.getByText('Read the caution and acknowledge it before the run starts.')).toBeTruthy();
    expect(api.posts('/runs')).toHaveLength(0);
  });

  test('takes where the dials stand, an empty field as unknown, and explains a wrong one', async () => {
    const api = new FakeApi(makeRun(version), version);
    const { user, router } = openBench(api, { path });
    await user.click(await screen.findByRole('checkbox'));
    const first = screen.getByRole('textbox', { name: 'H-3 says, degrees' });
    await user.type(first, '83,5');
    await user.click(await screen.findByRole('button', { name: 'Start the run' }));
    expect(screen.getByText('Write a point for decimals, as in 83.4.')).toBeTruthy();
    expect(api.posts('/runs')).toHaveLength(0);
    await user.clear(first);
    await user.type(first, '83.5');
    await user.click(await screen.findByRole('button', { name: 'Start the run' }));
    await waitFor(() => expect(api.posts('/runs')).toHaveLength(1));
    const [asked] = api.posts('/runs');
    expect(startRunSchema.parse(asked?.body).startDialsDeg).toEqual([83.5, null]);
    expect(asked?.key).toMatch(/^[0-9a-f]{32}$/u);
    await waitFor(() => expect(router.state.location.pathname).toMatch(/\/bench\/runs\//u));
  });

  test('says why the server would not start it, and a second try carries the same key', async () => {
    const api = new FakeApi(makeRun(version), version);
    const { user } = openBench(api, { path });
    await user.click(await screen.findByRole('checkbox'));
    api.failWith = 'network';
    await user.click(await screen.findByRole('button', { name: 'Start the run' }));
    expect(await screen.findByText(/The run did not start\. The server cannot be reached/u)).toBeTruthy();
    await user.click(await screen.findByRole('button', { name: 'Start the run' }));
    await waitFor(() => expect(api.posts('/runs')).toHaveLength(2));
    expect(new Set(api.posts('/runs').map(({ key }) => key)).size).toBe(1);
  });

  test('lists the versions when none is named, and a guest starts none', async () => {
    openBench(new FakeApi(makeRun(version), version), { path: `/labs/${labId}/bench/start` });
    const link = await screen.findByRole('link', { name: 'Tetrahedron, signal arm, version 14' });
    expect(link.getAttribute('href')).toBe(path);
    cleanup();
    openBench(new FakeApi(makeRun(version), version), { path, role: 'guest' });
    expect(await screen.findByText('A guest reads runs and does not start them')).toBeTruthy();
  });
});
