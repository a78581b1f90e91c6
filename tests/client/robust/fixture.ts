import type { Bench } from '../../../shared/schemas/benches';
import type { Plate } from '../../../shared/schemas/cabinet';

export const id = (number: number) => `0197c3a0-0000-7000-8000-${String(number).padStart(12, '0')}`;
const at = '2026-11-01T09:00:00.000Z';

export function plate(
  number: number,
  name: string,
  retardanceDeg: number,
  change: Partial<Plate> = {},
): Plate {
  return {
    id: id(number),
    name,
    kind: retardanceDeg > 135 ? 'half' : 'quarter',
    designWavelengthNm: 810,
    construction: 'compound-zero-order',
    material: 'quartz',
    order: 0,
    note: '',
    mount: {
      name: `M-${number}`,
      direction: 1,
      resolutionDeg: 0.1,
      repeatabilityDeg: 0.02,
      rangeDeg: null,
      speedDegPerS: null,
      backlashDeg: 0,
      approach: 'either',
    },
    seatedAt: at,
    calibration: {
      id: id(number + 100),
      wavelengthNm: 810,
      temperatureC: null,
      retardanceDeg,
      retardanceSigmaDeg: 0.2,
      offsetDeg: 10,
      offsetSigmaDeg: 0.05,
      method: 'scan between crossed polarisers',
      note: '',
      measuredAt: at,
      recordedBy: 'Tomas Reuter',
    },
    retiredAt: null,
    benches: [],
    revision: 1,
    ...change,
  };
}

export function bench(number: number, name: string, plates: readonly Plate[]): Bench {
  return {
    id: id(number),
    name,
    wavelengthNm: 810,
    wavelengthSigmaNm: 0,
    temperatureC: null,
    temperatureSigmaK: 0,
    inputExpression: 'H',
    polariserSigmaDeg: 0.05,
    polariserExtinction: null,
    laserClass: '3B',
    hazardWavelengthsNm: [810],
    plates: [...plates],
    retiredAt: null,
    revision: 1,
  };
}
