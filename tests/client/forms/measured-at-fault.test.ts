import { describe, expect, it } from 'vitest';
import { measuredAtFault } from '../../../src/lib/measured-at-fault';

describe('the moment of a calibration', () => {
  // In the reader's own time zone, as the field has it.
  const seatedAt = new Date(2026, 3, 30, 10, 20, 40).toISOString();
  const now = new Date(2026, 3, 30, 11, 0, 0);
  const fault = (typed: string) => measuredAtFault(typed, seatedAt, now);

  it('is not before the plate was seated as it is, since a zero of an earlier seat does not hold', () => {
    expect(fault('2026-04-30T10:14')).toMatch(
      /^It sits as it does now since today 10:20, and this is before that/u,
    );
    expect(fault('2026-04-30T10:20')).toBeNull();
    expect(measuredAtFault('2026-04-30T10:14', null, now)).toBeNull();
  });

  it('is not in the future', () => {
    expect(fault('2026-04-30T11:06')).toBe('This is in the future. Write when it was measured.');
    expect(fault('2026-04-30T11:04')).toBeNull();
  });

  it('is left to the schema while it is empty', () => {
    expect(fault('')).toBeNull();
  });
});
