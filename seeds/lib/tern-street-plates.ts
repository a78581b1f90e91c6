import type { CalibrationInput, CreatePlate, PlateKind } from '../../shared/schemas';
import type { LabStory } from './lab-story';
import type { Person } from './people';
import { scanOfQE } from './scan-of-q-e';
import { undescribed } from './undescribed';

type At = (daysAgo: number, time: string) => Date;

/** [days ago, wavelength nm, retardance °, its σ, zero °, its σ], oldest first. Invented. */
type Measured = readonly [number, number, number, number, number, number];

/** What happened to a seat: when, and why. The next measurement is of the next seat. */
type Moved = readonly [daysAgo: number, why: string];

interface PlateFacts {
  readonly name: string;
  readonly kind: PlateKind;
  readonly designWavelengthNm: number;
  readonly built: Built;
  readonly note: string;
  readonly mount: readonly [name: string, direction: 1 | -1, resolutionDeg: number, repeatabilityDeg: number];
  readonly measured: readonly Measured[];
  readonly serial?: string;
  /** Taken out and put back into the same mount. */
  readonly reseated?: readonly Moved[];
  /** Taken out for good. */
  readonly takenOut?: Moved;
  /** Scanned between polarisers after all that was measured by hand; that leaves fast and slow open. */
  readonly scanned?: {
    readonly daysAgo: number;
    readonly wavelengthNm: number;
    readonly file: typeof scanOfQE;
  };
}

type Built = Pick<CreatePlate, 'construction' | 'material' | 'order'>;
const quartz: Built = { construction: 'compound-zero-order', material: 'quartz', order: 0 };
const unknown: Built = { construction: 'unknown', material: null, order: 0 };

const plates: readonly PlateFacts[] = [
  {
    name: 'H-1',
    kind: 'half',
    designWavelengthNm: 780,
    built: quartz,
    note: '',
    mount: ['M01', 1, 0.1, 0.05],
    measured: [
      [240, 780, 180.6, 0.3, 77.86, 0.05],
      [86, 780, 180.4, 0.3, 77.9, 0.06],
    ],
  },
  {
    name: 'H-2',
    kind: 'half',
    designWavelengthNm: 780,
    built: quartz,
    note: '',
    mount: ['M02', -1, 0.2, 0.1],
    measured: [[38, 780, 178.8, 0.5, 110.24, 0.09]],
  },
  {
    name: 'H-3',
    kind: 'half',
    designWavelengthNm: 808,
    built: quartz,
    note: '',
    mount: ['M03', 1, 0.1, 0.06],
    measured: [
      [300, 810, 179.3, 0.4, 12.31, 0.06],
      [150, 810, 179.2, 0.3, 12.34, 0.05],
      [9, 810, 179.2, 0.3, 12.4, 0.05],
    ],
  },
  {
    name: 'H-4',
    kind: 'half',
    designWavelengthNm: 808,
    built: { construction: 'true-zero-order', material: null, order: 0 },
    note: 'Polymer, cemented.',
    mount: ['M04', -1, 0.1, 0.06],
    measured: [
      [128, 810, 181.9, 0.6, 264.11, 0.08],
      [46, 810, 181.7, 0.6, 264.18, 0.07],
    ],
  },
  {
    name: 'H-5',
    kind: 'half',
    designWavelengthNm: 808,
    built: quartz,
    note: '',
    mount: ['M07', 1, 0.05, 0.02],
    measured: [[30, 810, 179.6, 0.2, 355.07, 0.03]],
  },
  {
    name: 'Q-A',
    kind: 'quarter',
    designWavelengthNm: 808,
    built: quartz,
    note: '',
    mount: ['M06', 1, 0.1, 0.06],
    measured: [[20, 810, 89.8, 0.3, 44.62, 0.06]],
  },
  {
    name: 'Q-B',
    kind: 'quarter',
    designWavelengthNm: 808,
    built: quartz,
    note: '',
    mount: ['M05', -1, 0.1, 0.06],
    measured: [
      [310, 810, 88.7, 0.5, 301.78, 0.1],
      [170, 810, 88.9, 0.5, 301.7, 0.1],
      [120, 810, 88.8, 0.5, 12.05, 0.1],
      [47, 810, 86.9, 0.4, 301.73, 0.09],
    ],
    serial: 'QW-0418',
    reseated: [
      [125, 'Taken out to clean a fingerprint off.'],
      [48, 'Its retaining ring had worked loose.'],
    ],
  },
  {
    name: 'Q-C',
    kind: 'quarter',
    designWavelengthNm: 780,
    built: quartz,
    note: '',
    mount: ['M08', -1, 0.1, 0.05],
    measured: [[58, 785, 90.9, 0.4, 151.36, 0.08]],
  },
  {
    name: 'Q-D',
    kind: 'quarter',
    designWavelengthNm: 808,
    built: { construction: 'true-zero-order', material: null, order: 0 },
    note: 'Polymer, cemented.',
    mount: ['M09', 1, 0.1, 0.06],
    measured: [[102, 810, 92.3, 0.6, 60.41, 0.1]],
  },
  {
    name: 'Q-E',
    kind: 'quarter',
    designWavelengthNm: 780,
    built: quartz,
    note: '',
    mount: ['M10', 1, 0.2, 0.1],
    measured: [[140, 780, 89.4, 0.5, 214.31, 0.12]],
    reseated: [[17, 'Turned in its ring to clear the engraving.']],
    scanned: { daysAgo: 16, wavelengthNm: 780, file: scanOfQE },
  },
  {
    name: 'Q-F',
    kind: 'quarter',
    designWavelengthNm: 780,
    built: { construction: 'multi-order', material: 'quartz', order: 6 },
    note: 'Spare.',
    mount: ['M11', -1, 0.5, 0.2],
    measured: [[190, 780, 91.6, 0.8, 233.5, 0.3]],
    takenOut: [95, 'M11 went to the diode table.'],
  },
  {
    name: 'T-1',
    kind: 'other',
    designWavelengthNm: 780,
    built: unknown,
    note: 'Near a third of a wave, from a broken stack.',
    mount: ['M12', -1, 0.1, 0.06],
    measured: [[63, 780, 118.6, 0.5, 199.27, 0.08]],
  },
];

/** The dozen plates of the lab, with what was measured of each over the year; answers each plate's id by its name. */
export function tellPlates(
  story: LabStory,
  at: At,
  people: { readonly designer: Person; readonly operator: Person },
): (name: string) => string {
  const ids = new Map<string, string>();
  for (const facts of plates) {
    const [first] = facts.measured;
    if (first === undefined) throw new Error('a plate is measured before it is used');
    const id = story.plate(at(first[0], '10:20'), people.designer, newPlate(facts));
    for (const [daysAgo, why] of facts.reseated ?? []) {
      story.reseat(at(daysAgo, '10:20'), people.operator, id, why);
    }
    for (const measured of facts.measured) {
      const by = measured === first ? people.designer : people.operator;
      story.calibration(at(measured[0], '11:15'), by, id, calibration(measured, at));
    }
    if (facts.scanned !== undefined) {
      const { daysAgo, wavelengthNm, file } = facts.scanned;
      story.scan(at(daysAgo, '11:15'), people.operator, id, {
        ...file,
        wavelengthNm,
        temperatureC: 21,
        measuredAt: at(daysAgo, '10:52'),
      });
    }
    if (facts.takenOut !== undefined) {
      const [daysAgo, why] = facts.takenOut;
      story.takeOut(at(daysAgo, '16:30'), people.operator, id, why);
    }
    ids.set(facts.name, id);
  }
  return (name) => {
    const id = ids.get(name);
    if (id === undefined) throw new Error(`${name} is not in the cabinet`);
    return id;
  };
}

function newPlate(facts: PlateFacts): CreatePlate {
  const [name, direction, resolutionDeg, repeatabilityDeg] = facts.mount;
  const motor = resolutionDeg < 0.1;
  return {
    ...undescribed,
    name: facts.name,
    kind: facts.kind,
    designWavelengthNm: facts.designWavelengthNm,
    ...facts.built,
    serial: facts.serial ?? '',
    note: facts.note,
    seat: {
      kind: 'new-mount',
      since: null,
      mount: {
        name,
        drive: motor ? 'motor' : 'hand',
        note: '',
        direction,
        resolutionDeg,
        repeatabilityDeg,
        rangeDeg: null,
        speedDegPerS: motor ? 20 : null,
        backlashDeg: motor ? 0.05 : 0,
        approach: motor ? 'rising' : 'either',
      },
      calibration: null,
    },
  };
}

function calibration(
  [daysAgo, wavelengthNm, retardanceDeg, retardanceSigmaDeg, offsetDeg, offsetSigmaDeg]: Measured,
  at: At,
): CalibrationInput {
  return {
    wavelengthNm,
    temperatureC: 21,
    retardanceDeg,
    retardanceSigmaDeg,
    offsetDeg,
    offsetSigmaDeg,
    method: 'Turned between crossed polarisers',
    note: '',
    openQuestions: [],
    settlesId: null,
    measuredAt: at(daysAgo, '10:52').toISOString(),
  };
}
