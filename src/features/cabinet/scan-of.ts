import type { SeatedCalibration } from '../../../shared/schemas/cabinet';

/** The scan that a calibration was fitted from: where a person settled what one left open, it is still that measurement. */
export function scanOf(id: string, all: readonly SeatedCalibration[]): SeatedCalibration | undefined {
  const found = all.find((one) => one.id === id);
  if (found?.scan !== null) return found;
  const settled = all.find((one) => one.id === found.settlesId);
  return settled?.measuredAt === found.measuredAt ? scanOf(settled.id, all) : undefined;
}
