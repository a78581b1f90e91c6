import { cleanup, screen } from '@testing-library/react';
import { afterEach, describe, expect, it, vi } from 'vitest';
import { open, serve } from './cabinet-harness';
import { detailFixture, mountFixture, plateFixture } from './plate-fixture';

const plate = plateFixture();
const openAxis = plateFixture({ calibration: { openQuestions: ['axis'] }, health: 'open-question' });
const start = () => serve({ plates: [plate], detail: detailFixture(plate), mounts: [mountFixture()] });

afterEach(() => {
  cleanup();
  vi.unstubAllGlobals();
});

describe('a task of the cabinet that is opened by its address', () => {
  it.each([
    ['guest', '?do=add', 'Plates and mounts are added by designers and leads'],
    ['operator', '?do=add', 'Plates and mounts are added by designers and leads'],
    ['guest', '?do=calibrate', 'Calibrations are recorded by operators, designers and leads'],
    ['guest', `/${plate.id}?do=calibrate`, 'Calibrations are recorded by operators, designers and leads'],
    ['guest', `/${plate.id}?do=settle-axis`, 'Calibrations are recorded by operators, designers and leads'],
    ['operator', `/${plate.id}?do=edit`, 'Plates and mounts are edited by designers and leads'],
    ['operator', `/${plate.id}?do=take-out`, 'Plates are seated and taken out by designers and leads'],
  ] as const)('says to role %s at %s who may do it, over the cabinet', async (role, rest, sentence) => {
    start();
    open(role, rest);
    expect((await screen.findByRole('alert')).textContent).toContain(sentence);
    expect(await screen.findByRole('article', { name: 'Q-B' })).toBeDefined();
    expect(
      screen.queryByRole('button', { name: /Add the plate|Record the calibration|Take Q-B out/ }),
    ).toBeNull();
  });

  it('refuses nothing to those who may, and nothing where no task is asked for', async () => {
    start();
    open('operator', `/${plate.id}?do=calibrate`);
    expect(await screen.findByRole('button', { name: 'Record the calibration' })).toBeDefined();
    expect(screen.queryByText(/Ask the lab/)).toBeNull();
    cleanup();
    open('guest', '');
    expect(await screen.findByRole('article', { name: 'Q-B' })).toBeDefined();
    expect(screen.queryByText(/Ask the lab/)).toBeNull();
  });
});

describe('the sheet of a plate', () => {
  it('offers a guest nothing to change', async () => {
    serve({ plates: [openAxis], detail: detailFixture(openAxis) });
    open('guest', `/${plate.id}`);
    expect(await screen.findByRole('heading', { name: 'Fast or slow? Not settled' })).toBeDefined();
    expect(screen.queryByRole('link', { name: /Edit|Take|Seat|Record|record|Scan|Add a plate/ })).toBeNull();
    expect(screen.queryByLabelText(/add a photo/)).toBeNull();
    expect(screen.queryByRole('button', { name: /Retire/ })).toBeNull();
  });

  it('lets an operator measure and not move', async () => {
    serve({ plates: [openAxis], detail: detailFixture(openAxis) });
    open('operator', `/${plate.id}`);
    expect(await screen.findByRole('link', { name: 'Scan behind circular light' })).toHaveProperty(
      'href',
      expect.stringMatching(/\/scan\?light=known$/),
    );
    expect(screen.getByRole('link', { name: 'Scan between polarisers' })).toHaveProperty(
      'href',
      expect.stringMatching(/\/scan$/),
    );
    expect(screen.queryByRole('link', { name: /Take|Seat it|Edit/ })).toBeNull();
  });
});
