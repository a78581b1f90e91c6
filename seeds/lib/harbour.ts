import { DEFAULT_CONVENTION } from '../../shared/optics/convention';
import type { Transaction } from '../../server/db/database';
import { seeAs } from '../../server/db/in-transaction';
import { newId } from '../../server/db/new-id';
import { insertLab } from '../../server/features/labs';
import { LabStory } from './lab-story';
import { addPeople } from './people';
import { rows } from './targets';
import { undescribed } from './undescribed';

const ring = {
  drive: 'hand',
  note: '',
  direction: 1,
  resolutionDeg: 0.5,
  repeatabilityDeg: 0.2,
  rangeDeg: null,
  speedDegPerS: null,
  backlashDeg: 0,
  approach: 'either',
} as const;

/** A second lab, which is there so that the first can be seen not to see it. Everything in it is invented. */
export async function seedHarbour(
  transaction: Transaction,
  at: (daysAgo: number, time: string) => Date,
): Promise<void> {
  const lab = {
    id: newId(at(100, '08:00')),
    name: 'Harbour photonics',
    convention: DEFAULT_CONVENTION,
    calibrationDueDays: 180,
  };
  await seeAs(transaction, { userId: null, labId: lab.id });
  await insertLab(transaction, lab);
  const person = await addPeople(
    transaction,
    lab.id,
    { 'oskar-lindqvist': 'lead', 'noor-haddad': 'designer' },
    at(100, '08:05'),
  );
  const [oskar, noor] = [person('oskar-lindqvist'), person('noor-haddad')];
  const story = new LabStory(transaction, lab);
  const measured = {
    method: 'From the maker’s sheet, zero by hand',
    note: '',
    openQuestions: [],
    settlesId: null,
    measuredAt: at(90, '09:30').toISOString(),
  };
  const half = story.plate(at(90, '09:30'), oskar, {
    name: 'HWP 1',
    kind: 'half',
    designWavelengthNm: 1550,
    construction: 'compound-zero-order',
    material: 'quartz',
    order: 0,
    ...undescribed,
    seat: {
      kind: 'new-mount',
      since: null,
      mount: { ...ring, name: 'R1' },
      calibration: {
        wavelengthNm: 1550,
        temperatureC: null,
        retardanceDeg: 180.9,
        retardanceSigmaDeg: 0.8,
        offsetDeg: 3.5,
        offsetSigmaDeg: 0.3,
        ...measured,
      },
    },
  });
  const quarter = story.plate(at(90, '09:30'), oskar, {
    name: 'QWP 1',
    kind: 'quarter',
    designWavelengthNm: 1550,
    construction: 'compound-zero-order',
    material: 'quartz',
    order: 0,
    ...undescribed,
    seat: {
      kind: 'new-mount',
      since: null,
      mount: { ...ring, name: 'R2' },
      calibration: {
        wavelengthNm: 1550,
        temperatureC: null,
        retardanceDeg: 90.4,
        retardanceSigmaDeg: 0.8,
        offsetDeg: 181,
        offsetSigmaDeg: 0.3,
        ...measured,
      },
    },
  });
  const bench = story.bench(at(80, '10:00'), oskar, {
    name: 'fibre bench',
    wavelengthNm: 1550,
    wavelengthSigmaNm: 0,
    temperatureC: null,
    temperatureSigmaK: 0,
    inputExpression: 'H',
    polariserSigmaDeg: 0.2,
    polariserExtinction: null,
    laserClass: null,
    hazardWavelengthsNm: [1550],
    plateIds: [half, quarter],
    analysisPlateIds: [],
    detectors: { passed: null, rejected: null, efficiencyRatio: null },
  });
  const protocol = story.protocol(at(60, '11:00'), noor, {
    name: 'Link check',
    purpose: 'Two bases before each session on the link.',
    kind: 'prepare',
    benchId: bench,
    objective: 'least-expected-infidelity',
    presentDialsDeg: null,
    toleranceInfidelity: 5e-3,
    targets: rows([
      ['H', 'H'],
      ['V', 'V'],
      ['D', 'D'],
      ['A', 'A'],
    ]),
  });
  story.version(at(60, '11:30'), noor, protocol, 'Two bases, as agreed with the other end.');
  await story.tell();
}
