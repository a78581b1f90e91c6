import { type Plate, plateSchema } from '../../../shared/schemas/cabinet';
import { idsFrom, plate, type PlateChange } from '../../support/plates';

const id = idsFrom('0190a000');

/** The quarter-wave plate that the pages of a cabinet are tried with. */
export function plateFixture({ mount, calibration, ...change }: PlateChange<Plate> = {}): Plate {
  return plateSchema.parse(
    plate({
      name: 'Q-B',
      kind: 'quarter',
      designWavelengthNm: 808,
      mount: { name: 'M05', direction: -1, repeatabilityDeg: 0.06, ...mount },
      seatedAt: '2026-01-10T09:00:00.000Z',
      calibration: {
        retardanceDeg: 88.9,
        retardanceSigmaDeg: 0.4,
        offsetDeg: 301.73,
        offsetSigmaDeg: 0.09,
        method: 'between crossed polarisers, 31 points',
        measuredAt: '2026-03-01T12:00:00.000Z',
        recordedBy: 'Sami Oduya',
        ...calibration,
      },
      benches: [{ id: id(3), name: 'signal arm' }],
      revision: 3,
      ...change,
    }),
  );
}
