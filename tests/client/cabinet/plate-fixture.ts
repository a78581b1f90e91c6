import { type Plate, plateSchema } from '../../../shared/schemas/cabinet';

/** A plate as the API gives one; an invented one. */
export function plateFixture(change: Partial<Plate> = {}): Plate {
  return plateSchema.parse({
    id: '0190a000-0000-7000-8000-000000000001',
    name: 'Q-B',
    kind: 'quarter',
    designWavelengthNm: 808,
    construction: 'compound-zero-order',
    material: 'quartz',
    order: 0,
    note: '',
    mount: {
      name: 'M05',
      direction: -1,
      resolutionDeg: 0.1,
      repeatabilityDeg: 0.06,
      rangeDeg: null,
      speedDegPerS: null,
      backlashDeg: 0,
      approach: 'either',
    },
    seatedAt: '2026-01-10T09:00:00.000Z',
    calibration: {
      id: '0190a000-0000-7000-8000-000000000002',
      wavelengthNm: 810,
      temperatureC: null,
      retardanceDeg: 88.9,
      retardanceSigmaDeg: 0.4,
      offsetDeg: 301.73,
      offsetSigmaDeg: 0.09,
      method: 'between crossed polarisers, 31 points',
      note: '',
      measuredAt: '2026-03-01T12:00:00.000Z',
      recordedBy: 'Sami Oduya',
    },
    retiredAt: null,
    benches: [{ id: '0190a000-0000-7000-8000-000000000003', name: 'signal arm' }],
    revision: 3,
    ...change,
  });
}
