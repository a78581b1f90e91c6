import { cleanup, screen, waitFor, within } from '@testing-library/react';
import { afterEach, describe, expect, it, vi } from 'vitest';
import type { StoredFile } from '../../../shared/schemas/files';
import { fakeUploads } from '../lib/fake-uploads';
import { address, cabinet, open, problem, serve, writes } from './cabinet-harness';
import { detailFixture, mountFixture, plateFixture, seatFixture } from './plate-fixture';

const idOf = (number: number) => `0190b000-0000-7000-8000-${String(number).padStart(12, '0')}`;
const plate = plateFixture();
const hash = 'ab'.repeat(32);

afterEach(() => {
  cleanup();
  vi.unstubAllGlobals();
});

describe('the tray', () => {
  const others = ['H-1', 'H-2'].map((name, index) => plateFixture({ id: idOf(index), name, kind: 'half' }));

  it('opens the plate that an address names though it is on no page that has come', async () => {
    serve({ plates: others, detail: detailFixture(plate) });
    open('guest', `/${plate.id}`);
    expect(await screen.findByRole('article', { name: 'Q-B' })).toBeDefined();
    const tray = within(screen.getByRole('navigation', { name: 'Plates' }));
    expect(tray.getAllByRole('link').map(({ textContent }) => textContent.slice(0, 3))).toEqual([
      'Q-B',
      'H-1',
      'H-2',
    ]);
    expect(tray.getByRole('link', { current: 'page' }).textContent).toMatch(/^Q-B/);
  });

  it('is walked by arrow keys', async () => {
    serve({ plates: others, detail: detailFixture(others[0] ?? plate) });
    const press = open('guest');
    await screen.findByRole('article');
    await press.keyboard('{ArrowRight}');
    expect(address()).toBe(`/${idOf(1)}`);
  });

  it('is one stop of the Tab key, and the focus goes along with the arrows', async () => {
    const [first, second] = others;
    serve({
      plates: others,
      special: ({ path }) => {
        const shown = others.find(({ id }) => path === `/plates/${id}`);
        return shown === undefined ? null : { status: 200, body: detailFixture(shown) };
      },
    });
    const press = open('guest', `/${first?.id ?? ''}`);
    await screen.findByRole('article', { name: 'H-1' });
    const tray = within(screen.getByRole('navigation', { name: 'Plates' }));
    expect(tray.getAllByRole('link').map((link) => link.tabIndex)).toEqual([0, -1]);
    tray.getByRole('link', { current: 'page' }).focus();
    await press.keyboard('{ArrowRight}');
    expect(await screen.findByRole('article', { name: 'H-2' })).toBeDefined();
    expect(address()).toBe(`/${second?.id ?? ''}`);
    expect(document.activeElement?.textContent).toMatch(/^H-2/u);
    expect(tray.getAllByRole('link').map((link) => link.tabIndex)).toEqual([-1, 0]);
  });

  it('says that there is no such plate', async () => {
    serve({
      plates: others,
      special: ({ path }) => (path.startsWith('/plates/') ? problem(404, 'None.') : null),
    });
    open('guest', `/${plate.id}`);
    expect(await screen.findByText(/There is no such plate here/)).toBeDefined();
  });
});

describe('a plate’s sheet', () => {
  it('sets the retardance beside the dispersion of its material, in degrees and in σ', async () => {
    const tilted = plateFixture({ calibration: { retardanceDeg: 86.9, retardanceSigmaDeg: 0.4 } });
    serve({ plates: [tilted], detail: detailFixture(tilted) });
    open('guest', `/${plate.id}`);
    // The brief's own figure for this plate: quartz, 808 nm, measured 86.9(4)° at 810 nm.
    expect(await screen.findByText('2.9° below quartz, 7σ: is it tilted?')).toBeDefined();
  });

  it('keeps the retardance of a plate that was taken out, and no zero', async () => {
    const out = plateFixture({ mount: null });
    serve({ plates: [out], detail: detailFixture(out, { calibrations: detailFixture(plate).calibrations }) });
    open('guest', `/${plate.id}`);
    expect((await screen.findByText('measured in an earlier seat')).closest('dd')?.textContent).toMatch(
      /^88\.9\(4\)°/u,
    );
    expect(screen.getByText('none: it sits nowhere')).toBeDefined();
  });

  it('does not call a zero void that nobody has measured', async () => {
    const bare = plateFixture({ calibration: null });
    serve({ plates: [bare], detail: detailFixture(bare, { calibrations: [] }) });
    open('guest', `/${plate.id}`);
    expect(await screen.findByText('not measured yet')).toBeDefined();
  });

  it('has every seat and calibration in one table, with the scan’s hash and a way to the file', async () => {
    const [newest] = detailFixture(plate).calibrations;
    if (newest === undefined) throw new Error('the plate is calibrated');
    const fileId = idOf(7);
    serve({
      plates: [plate],
      detail: detailFixture(plate, {
        seats: [
          seatFixture(4),
          seatFixture(5, {
            seatedAt: '2025-11-01T09:00:00.000Z',
            leftAt: '2026-01-10T09:00:00.000Z',
            leftWhy: 'Cleaned.',
          }),
        ],
        calibrations: [
          { ...newest, fileId, scan: { name: 'scan.csv', sha256: hash, sizeBytes: 4120, light: 'linear' } },
          { ...newest, id: idOf(8), seatId: seatFixture(5).id, offsetDeg: 12.05 },
        ],
      }),
    });
    open('guest', `/${plate.id}`);
    const table = within(await screen.findByRole('table'));
    expect(table.getByRole('rowheader', { name: /^Second seat ?, in M05/ })).toBeDefined();
    expect(
      table.getByRole('rowheader', { name: /^First seat.*its zeros are void\. Cleaned\./ }),
    ).toBeDefined();
    expect(table.getByText(hash)).toBeDefined();
    expect(table.getByRole('link', { name: 'Download scan.csv' }).getAttribute('href')).toBe(
      `/api/v1${cabinet.replace('/cabinet', '')}/files/${fileId}`,
    );
    const plot = screen.getByRole('img', { name: /2 calibrations in 2 seats/ });
    expect(plot.getAttribute('aria-describedby')).not.toBeNull();
  });

  it('shows both sides of an edit that somebody else was faster with', async () => {
    const { served, calls } = serve({ plates: [plate], detail: detailFixture(plate) });
    const press = open('designer', `/${plate.id}?do=edit`);
    await press.type(await screen.findByLabelText('serial number'), 'QW-0418');
    served.special = ({ method, ifMatch }) =>
      method === 'PUT' && ifMatch === '"r3"'
        ? problem(412, 'Changed meanwhile.', { current: plateFixture({ note: 'scratched', revision: 4 }) })
        : null;
    await press.click(screen.getByRole('button', { name: 'Save Q-B' }));
    expect(
      await screen.findByRole('heading', { name: 'Q-B was changed while you were editing it' }),
    ).toBeDefined();
    expect(screen.getByRole('row', { name: 'serial number — QW-0418' })).toBeDefined();
    expect(screen.getByRole('row', { name: 'note scratched —' })).toBeDefined();
    await press.click(screen.getByRole('button', { name: 'Save yours over it' }));
    await waitFor(() => expect(writes(calls).map(({ ifMatch }) => ifMatch)).toEqual(['"r3"', '"r4"']));
  });
});

describe('photos and data sheets', () => {
  const stored: StoredFile = {
    id: idOf(9),
    name: 'Q-B.png',
    mediaType: 'image/png',
    sha256: hash,
    sizeBytes: 48_211,
    uploadedBy: 'Ines Varga',
    uploadedAt: '2026-04-30T08:52:00.000Z',
  };
  const withPhoto = detailFixture(plate, { files: [{ ...stored, kind: 'photo' }] });

  it('say their limit first, show how far a file is, and attach it as what it is', async () => {
    const uploads = fakeUploads();
    const { served, calls } = serve({ plates: [plate], detail: detailFixture(plate) });
    const press = open('designer', `/${plate.id}`);
    const field = await screen.findByLabelText('add a photo or a data sheet');
    expect(screen.getByText(/at most 10 MB/)).toBeDefined();
    await press.upload(field, new File(['x'], 'Q-B.png', { type: 'image/png' }));
    uploads.latest().progress(1, 2);
    await waitFor(() =>
      expect(screen.getByRole('progressbar', { name: 'Sending Q-B.png' }).getAttribute('aria-valuenow')).toBe(
        '50',
      ),
    );
    served.detail = withPhoto;
    uploads.latest().answer(201, stored);
    expect(await screen.findByRole('img', { name: 'Photo of Q-B: Q-B.png' })).toBeDefined();
    expect(writes(calls)).toMatchObject([
      { path: `/plates/${plate.id}/files`, body: { fileId: stored.id, kind: 'photo' } },
    ]);
    expect(screen.getByText(/photo, 48\skB, Ines Varga/)).toBeDefined();
  });

  it('say why a file was refused, and stop one that is cancelled without a word', async () => {
    const uploads = fakeUploads();
    serve({ plates: [plate], detail: detailFixture(plate) });
    const press = open('designer', `/${plate.id}`);
    const field = await screen.findByLabelText('add a photo or a data sheet');
    await press.upload(field, new File(['PK'], 'sheet.txt', { type: 'text/plain' }));
    uploads.latest().answer(422, problem(422, 'sheet.txt is ZIP (application/zip).').body);
    expect(await screen.findByText('sheet.txt is ZIP (application/zip).')).toBeDefined();
    await press.upload(field, new File(['x'], 'other.txt', { type: 'text/plain' }));
    await press.click(await screen.findByRole('button', { name: 'Cancel' }));
    await waitFor(() => expect(screen.queryByRole('progressbar')).toBeNull());
    expect(screen.queryByText(/refused|cancelled|ZIP/)).toBeNull();
  });

  it('can be taken off by who keeps the cabinet, and downloaded by everyone', async () => {
    const { calls } = serve({ plates: [plate], detail: withPhoto });
    const press = open('designer', `/${plate.id}`);
    await press.click(await screen.findByRole('button', { name: 'Take off Q-B.png' }));
    expect(writes(calls)).toMatchObject([
      { method: 'DELETE', path: `/plates/${plate.id}/files/${stored.id}` },
    ]);
    cleanup();
    open('guest', `/${plate.id}`);
    expect(await screen.findByRole('link', { name: 'Q-B.png' })).toHaveProperty('download', '');
    expect(screen.queryByRole('button', { name: /Take off/ })).toBeNull();
  });
});

describe('a mount’s page', () => {
  it('has its history, and a motor’s own fields when it is edited', async () => {
    const motor = mountFixture({ drive: 'motor', speedDegPerS: 20, approach: 'rising' });
    const { calls } = serve({ mounts: [motor] });
    const press = open('designer', `/mounts/${motor.id}?do=edit`);
    const speed = await screen.findByLabelText('speed, degrees a second');
    await press.clear(speed);
    await press.type(speed, '25');
    await press.click(screen.getByRole('button', { name: 'Save M13' }));
    await waitFor(() =>
      expect(writes(calls)).toMatchObject([
        { method: 'PUT', body: { drive: 'motor', speedDegPerS: 25, approach: 'rising' }, ifMatch: '"r1"' },
      ]),
    );
    expect(await screen.findByText('No plate has sat in it yet.')).toBeDefined();
  });
});
