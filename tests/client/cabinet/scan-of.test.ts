import { describe, expect, it } from 'vitest';
import type { SeatedCalibration } from '../../../shared/schemas/cabinet';
import { scanOf } from '../../../src/features/cabinet/scan-of';
import { detailFixture, plateFixture } from './plate-fixture';

const [measured] = detailFixture(plateFixture()).calibrations;
if (measured === undefined) throw new Error('the plate is calibrated');
const scan = { name: 'q-b.csv', sha256: 'ab'.repeat(32), sizeBytes: 600, light: 'linear' } as const;
const calibration = (id: string, change: Partial<SeatedCalibration> = {}): SeatedCalibration => ({
  ...measured,
  id,
  settlesId: null,
  scan: null,
  ...change,
});
const of = (id: string, ...all: readonly SeatedCalibration[]) => scanOf(id, all)?.id;

describe('the scan that stands on a plate’s sheet', () => {
  const scanned = calibration('scanned', { scan });

  it('is the one that the calibration was fitted from', () => {
    expect(of('scanned', scanned)).toBe('scanned');
    expect(of('typed', calibration('typed'), scanned)).toBeUndefined();
  });

  it('stays as long as people only settle what it left open, one question after the other', () => {
    const axis = calibration('axis', { settlesId: 'scanned' });
    const branch = calibration('branch', { settlesId: 'axis' });
    expect(of('branch', branch, axis, scanned)).toBe('scanned');
  });

  it('goes with a new measurement, also one that settles it', () => {
    const later = calibration('later', { settlesId: 'scanned', measuredAt: '2026-05-01T12:00:00.000Z' });
    expect(of('later', later, scanned)).toBeUndefined();
  });
});
