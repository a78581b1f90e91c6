import type { Calibration } from '../schemas/calibrations';
import type { ScanRecord } from '../schemas/scans';
import type { ScanLight, ScanToFit } from './fit-scan';
import type { DescribedPlate, MeasuredBefore } from './nominal';

type Measured = Pick<
  Calibration,
  'wavelengthNm' | 'temperatureC' | 'retardanceDeg' | 'retardanceSigmaDeg' | 'openQuestions'
>;

/** What a calibration says of a plate's retardance to a scan that comes after it. */
export function asMeasuredBefore({
  wavelengthNm,
  retardanceDeg,
  retardanceSigmaDeg,
  openQuestions,
}: Omit<Measured, 'temperatureC'>): MeasuredBefore {
  return { wavelengthNm, retardanceDeg, retardanceSigmaDeg, isBranchOpen: openQuestions.includes('branch') };
}

/**
 * A recorded scan as it is fitted again from its file, by the page that shows it and by page and server for a scan that is
 * taken together with it: the same bits. Of what it left open, the branch that was recorded is taken.
 */
export function recordedScan(
  calibration: Measured,
  record: ScanRecord,
  bytes: Uint8Array,
  plate: DescribedPlate,
): ScanToFit {
  return {
    bytes,
    columns: record.columns,
    light: lightOf(record),
    leftOutLines: record.leftOut.map(({ line }) => line),
    plate,
    direction: record.direction,
    wavelengthNm: calibration.wavelengthNm,
    temperatureC: calibration.temperatureC,
    measuredBefore: asMeasuredBefore(calibration),
  };
}

function lightOf({ light, inputStokes }: ScanRecord): ScanLight {
  if (light.kind === 'linear') return light;
  const { analyserDeg, extinction } = light;
  return { kind: 'known', input: inputStokes ?? [0, 0, 0], analyserDeg, extinction, before: null };
}
