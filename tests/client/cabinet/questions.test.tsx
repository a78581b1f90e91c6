import { cleanup, screen, waitFor, within } from '@testing-library/react';
import fc from 'fast-check';
import { afterEach, beforeAll, describe, expect, it, vi } from 'vitest';
import { wrap } from '../../../shared/optics/units';
import { settledCalibration, twoReadings } from '../../../src/features/cabinet/questions/settle';
import { address, open, problem, serve, writes } from './cabinet-harness';
import { detailFixture, plateFixture } from './plate-fixture';

const asked = plateFixture({
  calibration: { openQuestions: ['axis', 'branch'], offsetDeg: 301.73 },
  health: 'open-question',
});
const calibration = asked.calibration;

beforeAll(() => {
  HTMLDialogElement.prototype.showModal = function showModal() {
    this.open = true;
  };
  HTMLDialogElement.prototype.close = function close() {
    this.open = false;
  };
});
afterEach(() => {
  cleanup();
  vi.unstubAllGlobals();
});

describe('an open question', () => {
  it('says what it means in this plate’s own numbers, and the ways to settle it', async () => {
    serve({ plates: [asked], detail: detailFixture(asked) });
    open('operator', `/${asked.id}`);
    const axis = await screen.findByRole('region', { name: 'Fast or slow? Not settled' });
    // 301.73 + 90, once round the dial.
    expect(axis.textContent).toContain('If 31.73(9)° is the fast one, every circular state');
    expect(within(axis).getByRole('link', { name: 'Scan behind circular light' })).toBeDefined();
    const branch = screen.getByRole('region', { name: '88.9(4)° or 271.1(4)°? Not settled' });
    expect(within(branch).getByRole('link', { name: 'record which of the two it is' })).toBeDefined();
  });

  it.each([
    [178.6, 'Near 180° the retardance is hardly felt', 'Scan behind circular light', '?light=known'],
    [88.9, 'Near 90° the retardance is hardly felt', 'Scan between polarisers', ''],
  ])('of a retardance of %s that was hardly felt leads to the light that feels it', async (...row) => {
    const [retardanceDeg, head, way, search] = row;
    const blind = plateFixture({ calibration: { openQuestions: ['blind'], retardanceDeg } });
    serve({ plates: [blind], detail: detailFixture(blind) });
    open('operator', `/${blind.id}`);
    const question = await screen.findByRole('region', { name: head });
    const link = within(question).getByRole('link', { name: way });
    expect(link.getAttribute('href')).toMatch(new RegExp(`/scan${search.replace('?', '\\?')}$`));
  });

  it('is settled by a person who says which reading it is and how that is known', async () => {
    const { calls } = serve({ plates: [asked], detail: detailFixture(asked) });
    const press = open('operator', `/${asked.id}?do=settle-axis`);
    const dialog = within(await screen.findByRole('dialog', { name: 'Which axis of Q-B is the fast one?' }));
    await press.click(dialog.getByRole('button', { name: 'Settle it' }));
    expect(dialog.getByText('Choose one of the two.')).toBeDefined();
    expect(dialog.getByText('Write how it is known.')).toBeDefined();
    await press.click(dialog.getByRole('radio', { name: /31\.73\(9\)°.*a quarter turn on/ }));
    await press.type(dialog.getByLabelText('how it is known'), 'Mark on its rim');
    await press.click(dialog.getByRole('button', { name: 'Settle it' }));
    expect(writes(calls)).toMatchObject([
      {
        method: 'POST',
        path: `/plates/${asked.id}/calibrations`,
        body: {
          offsetDeg: 31.73,
          retardanceDeg: 88.9,
          method: 'Mark on its rim',
          openQuestions: ['branch'],
          settlesId: calibration?.id,
          measuredAt: calibration?.measuredAt,
        },
      },
    ]);
    await waitFor(() => expect(address()).toBe(`/${asked.id}`));
    expect(screen.queryByRole('dialog')).toBeNull();
  });

  it('keeps what was chosen and typed when it is refused', async () => {
    const { served } = serve({ plates: [asked], detail: detailFixture(asked) });
    served.special = ({ method }) =>
      method === 'POST' ? problem(409, 'Q-B sits in no mount, so a zero would hold for nothing.') : null;
    const press = open('operator', `/${asked.id}?do=settle-branch`);
    const dialog = within(await screen.findByRole('dialog'));
    await press.click(dialog.getByRole('radio', { name: /271\.1\(4\)°/ }));
    await press.type(dialog.getByLabelText('how it is known'), 'Its maker’s sheet');
    await press.click(dialog.getByRole('button', { name: 'Settle it' }));
    expect(await dialog.findByText(/a zero would hold for nothing/)).toBeDefined();
    expect(dialog.getByLabelText('how it is known')).toHaveProperty('value', 'Its maker’s sheet');
    expect(dialog.getByRole('radio', { name: /271\.1/ })).toHaveProperty('checked', true);
  });
});

describe('the calibration that settles a question', () => {
  const anyCalibration = fc.record({
    offsetDeg: fc.integer({ min: 0, max: 3_599_999 }).map((units) => units / 1e4),
    retardanceDeg: fc.integer({ min: 1_000, max: 3_599_000 }).map((units) => units / 1e4),
  });

  it('is at the other axis a quarter turn on, on the dial, and a second swap is half a turn from the first', () => {
    fc.assert(
      fc.property(anyCalibration, (change) => {
        const before = { ...requireCalibration(), ...change };
        const { keptDeg, swappedDeg } = twoReadings(before, 'axis');
        expect(keptDeg).toBe(change.offsetDeg);
        expect(swappedDeg).toBeGreaterThanOrEqual(0);
        expect(swappedDeg).toBeLessThan(360);
        const again = twoReadings({ ...before, offsetDeg: swappedDeg }, 'axis').swappedDeg;
        expect(wrap(again - keptDeg, 360)).toBeCloseTo(180, 3);
      }),
    );
  });

  it('is at the other branch what is missing to a whole wave, and twice swapped the same', () => {
    fc.assert(
      fc.property(anyCalibration, (change) => {
        const before = { ...requireCalibration(), ...change };
        const { swappedDeg } = twoReadings(before, 'branch');
        expect(swappedDeg + change.retardanceDeg).toBeCloseTo(360, 9);
        const back = twoReadings({ ...before, retardanceDeg: swappedDeg }, 'branch').swappedDeg;
        expect(back).toBe(change.retardanceDeg);
      }),
    );
  });

  it('leaves every other value, σ and question as it was', () => {
    const before = requireCalibration();
    const settlement = { reading: 'kept', method: 'Mark on its rim', note: '' } as const;
    const settled = settledCalibration(before, { ...settlement, question: 'axis' });
    expect(settled).toMatchObject({
      offsetDeg: before.offsetDeg,
      offsetSigmaDeg: before.offsetSigmaDeg,
      retardanceDeg: before.retardanceDeg,
      openQuestions: ['branch'],
      settlesId: before.id,
    });
    const branch = settledCalibration(before, { ...settlement, question: 'branch', reading: 'swapped' });
    expect(branch).toMatchObject({
      offsetDeg: before.offsetDeg,
      retardanceDeg: 271.1,
      openQuestions: ['axis'],
    });
  });
});

function requireCalibration() {
  if (calibration === null) throw new Error('the plate is calibrated');
  return calibration;
}
