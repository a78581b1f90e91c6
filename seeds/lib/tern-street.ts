import { DEFAULT_CONVENTION } from '../../shared/optics/convention';
import type { DraftContent } from '../../shared/schemas';
import type { Transaction } from '../../server/db/database';
import { seeAs } from '../../server/db/in-transaction';
import { newId } from '../../server/db/new-id';
import { insertLab } from '../../server/features/labs';
import { LabStory } from './lab-story';
import { addPeople } from './people';
import { dialled } from './readings';
import { rows } from './targets';
import { tellPlates } from './tern-street-plates';

/** The demo lab: deep enough to plan, save, run and come back to all of it. Everything in it is invented. */
export async function seedTernStreet(
  transaction: Transaction,
  at: (daysAgo: number, time: string) => Date,
): Promise<void> {
  const lab = {
    id: newId(at(320, '09:00')),
    name: 'Tern Street quantum optics',
    convention: DEFAULT_CONVENTION,
    calibrationDueDays: 90,
  };
  await seeAs(transaction, { userId: null, labId: lab.id });
  await insertLab(transaction, lab);
  const person = await addPeople(
    transaction,
    lab.id,
    {
      'adaeze-holm': 'lead',
      'ines-varga': 'designer',
      'tomas-reuter': 'designer',
      'juno-petrak': 'operator',
      'sami-oduya': 'operator',
      'mirela-stanic': 'guest',
    },
    at(319, '09:00'),
  );
  const [ines, tomas, juno, sami] = [
    person('ines-varga'),
    person('tomas-reuter'),
    person('juno-petrak'),
    person('sami-oduya'),
  ];
  const story = new LabStory(transaction, lab);
  const plate = tellPlates(story, at, { designer: tomas, operator: sami });

  const signalArm = story.bench(at(56, '09:40'), tomas, {
    name: 'signal arm',
    wavelengthNm: 810,
    wavelengthSigmaNm: 0.3,
    temperatureC: 21,
    temperatureSigmaK: 0.5,
    inputExpression: 'H',
    polariserSigmaDeg: 0.05,
    polariserExtinction: 1e-6,
    laserClass: '3B',
    hazardWavelengthsNm: [405, 810],
    plateIds: [plate('H-3'), plate('Q-B')],
    analysisPlateIds: [plate('H-4')],
    detectors: {
      passed: { name: 'counter 1', darkRatePerS: 120 },
      rejected: { name: 'counter 2', darkRatePerS: 210 },
      efficiencyRatio: 0.96,
    },
  });
  const diodeTable = story.bench(at(56, '10:05'), tomas, {
    name: 'diode table',
    wavelengthNm: 780,
    wavelengthSigmaNm: 0.5,
    temperatureC: null,
    temperatureSigmaK: 1,
    inputExpression: 'H',
    polariserSigmaDeg: 0.08,
    polariserExtinction: null,
    laserClass: '3R',
    hazardWavelengthsNm: [780],
    plateIds: [plate('H-1'), plate('Q-C')],
    analysisPlateIds: [],
    detectors: {
      passed: { name: 'power meter', darkRatePerS: 0 },
      rejected: null,
      efficiencyRatio: null,
    },
  });

  const gateBench = story.bench(at(15, '11:20'), tomas, {
    name: 'gate bench',
    wavelengthNm: 810,
    wavelengthSigmaNm: 0.3,
    temperatureC: 21,
    temperatureSigmaK: 0.5,
    inputExpression: 'H',
    polariserSigmaDeg: 0.05,
    polariserExtinction: null,
    laserClass: '3B',
    hazardWavelengthsNm: [405, 810],
    plateIds: [plate('Q-A'), plate('H-5'), plate('Q-D')],
    analysisPlateIds: [],
    detectors: { passed: null, rejected: null, efficiencyRatio: null },
  });

  const six = rows([
    ['H', 'H'],
    ['V', 'V'],
    ['D', '(H + V)/sqrt(2)'],
    ['A', '(H - V)/sqrt(2)'],
    ['R', 'R'],
    ['L', 'L'],
  ]);
  const sixStates: DraftContent = {
    name: 'Six states, signal arm',
    purpose: 'The six states of three conjugate bases, to check the arm before each tomography.',
    kind: 'prepare',
    benchId: signalArm,
    objective: 'least-expected-infidelity',
    presentDialsDeg: null,
    toleranceInfidelity: 1e-3,
    targets: six.slice(0, 4),
  };
  const sixStatesId = story.protocol(at(55, '14:02'), ines, sixStates);
  story.version(at(55, '14:31'), ines, sixStatesId, 'The four linear states, to see the mounts through.');
  story.draft(at(41, '09:12'), ines, sixStatesId, { ...sixStates, targets: six });
  story.version(
    at(41, '09:20'),
    ines,
    sixStatesId,
    'Both circular states, now that Q-B is calibrated in its new seat.',
  );
  story.draft(at(5, '16:40'), tomas, sixStatesId, { ...sixStates, toleranceInfidelity: 5e-4, targets: six });
  story.version(at(5, '16:44'), tomas, sixStatesId, "Angles for H-3's new zero, and the tolerance halved.");

  const corners = rows([
    ['t0', '|H>'],
    ['t1', 'bloch(109.47deg, 0deg)'],
    ['t2', 'bloch(109.47deg, 120deg)'],
    ['t3', 'bloch(109.47deg, 240deg)'],
    ['d+', '(H + V)/sqrt(2)'],
    ['c+', '(H + i V)/sqrt(2)'],
    ['m8', 'cos(22.5deg) H + e^(i 45deg) sin(22.5deg) V'],
    ['w3', 'cos(22.5) H + sin(22.5deg) V'],
  ]);
  const tetrahedron: DraftContent = {
    name: 'Tetrahedron, signal arm',
    purpose: 'Four states that lie evenly on the sphere, with checks on two axes.',
    kind: 'prepare',
    benchId: signalArm,
    objective: 'least-expected-infidelity',
    presentDialsDeg: null,
    toleranceInfidelity: 2e-3,
    targets: corners.slice(0, 4),
  };
  const tetrahedronId = story.protocol(at(37, '10:08'), ines, tetrahedron);
  story.version(at(37, '10:42'), ines, tetrahedronId, 'The four corners.');
  story.draft(at(23, '15:30'), ines, tetrahedronId, { ...tetrahedron, targets: corners.slice(0, 5) });
  story.version(
    at(23, '15:41'),
    ines,
    tetrahedronId,
    'd+ added: a diagonal state shows a slipped H-3 first.',
  );
  const tighter = { ...tetrahedron, toleranceInfidelity: 1e-3 };
  story.draft(at(6, '11:02'), ines, tetrahedronId, { ...tighter, targets: corners.slice(0, 6) });
  story.version(
    at(6, '11:09'),
    ines,
    tetrahedronId,
    "c+ added, tolerance halved, angles for H-3's new zero.",
  );
  story.draft(at(1, '10:42'), ines, tetrahedronId, { ...tighter, targets: corners });

  const walk = rows(
    Array.from({ length: 12 }, (_, step): [string, string] => [`m${step}`, `linear(${step * 15}deg)`]),
  );
  const meridian: DraftContent = {
    name: 'Meridian walk, diode table',
    purpose: 'Linear states every 15 degrees: what the diode table does to an angle.',
    kind: 'prepare',
    benchId: diodeTable,
    objective: 'least-expected-infidelity',
    presentDialsDeg: null,
    toleranceInfidelity: 1e-3,
    targets: walk.slice(0, 6),
  };
  const meridianId = story.protocol(at(34, '13:20'), tomas, meridian);
  story.version(at(34, '13:44'), tomas, meridianId, 'The first quarter turn.');
  story.draft(at(28, '09:05'), tomas, meridianId, { ...meridian, targets: walk });
  story.version(at(28, '09:11'), tomas, meridianId, 'All twelve steps.');

  story.protocol(at(2, '17:26'), tomas, {
    name: 'Witness settings, signal arm',
    purpose: 'The analysis settings of the entanglement witness, as states.',
    kind: 'prepare',
    benchId: signalArm,
    objective: 'least-expected-infidelity',
    presentDialsDeg: null,
    toleranceInfidelity: 1e-3,
    targets: rows([
      ['w1', 'linear(22.5deg)'],
      ['w2', 'linear(67.5deg)'],
      ['w5', 'ellipse(45deg, 22.5deg)'],
    ]),
  });

  story.protocol(at(3, '11:05'), ines, {
    name: 'Gates, gate bench',
    purpose: 'One-qubit gates for the process check: what three real plates make of each.',
    kind: 'apply',
    benchId: gateBench,
    objective: 'least-expected-infidelity',
    presentDialsDeg: null,
    toleranceInfidelity: 1e-3,
    targets: rows([
      ['had', 'hadamard'],
      ['T', 'T'],
      ['rx', 'rotate(x, 50deg)'],
      ['dv', 'from D to V'],
      ['g4', 'zyz(30deg, 70deg, 110deg)'],
    ]),
  });

  story.run(at(22, '10:10'), sami, {
    protocolId: tetrahedronId,
    number: 2,
    readings: (version) => dialled(version, 5, { 2: [0, 1] }),
    end: { kind: 'finish' },
  });
  story.run(at(16, '14:00'), juno, {
    protocolId: meridianId,
    number: 2,
    readings: (version) =>
      dialled(version, 12, { 3: [1, 0], 7: [0, -1] }, { 9: 'The shutter stuck; nothing to see.' }),
    end: { kind: 'finish' },
  });
  story.run(at(4, '15:00'), sami, {
    protocolId: tetrahedronId,
    number: 3,
    readings: (version) => dialled(version, 6, { 4: [24, 0] }),
    end: { kind: 'finish' },
  });
  story.run(at(1, '17:40'), juno, {
    protocolId: sixStatesId,
    number: 3,
    readings: (version) => dialled(version, 3),
    end: { kind: 'pause', note: 'cryostat refill, back at nine' },
  });
  await story.tell();
}
