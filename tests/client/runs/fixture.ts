import { chooseSolution } from '../../../shared/protocol/choose-solutions';
import { frozenTarget } from '../../../shared/protocol/freeze';
import { benchProblem, solveRow } from '../../../shared/protocol/solve-row';
import type { Run } from '../../../shared/schemas/runs';
import { type FrozenPlate, type Version, versionSchema } from '../../../shared/schemas/versions';
import { frozenPlate, idsFrom, LIGHT, solvingTask } from '../../support/plates';

export const id = idsFrom('0197c3a0');

export const labId = id(1);
export const runId = id(231);
export const protocolId = id(14);
const at = '2026-11-30T09:00:00.000Z';

const task = solvingTask();
const light = { ...LIGHT, polariserSigmaDeg: 0.1 } as const;

const plate = (
  number: number,
  name: string,
  kind: 'half' | 'quarter',
  retardanceDeg: number,
  offsetDeg: number,
  direction: 1 | -1,
): FrozenPlate =>
  frozenPlate({
    id: id(number),
    name,
    kind,
    mount: { name: `M-${number}`, direction },
    calibration: {
      id: id(number + 100),
      retardanceDeg,
      retardanceSigmaDeg: 0.4,
      offsetDeg,
      measuredAt: at,
    },
  });

const convention = { phase: 'kz-wt', handedness: 'receiver', s3Sign: 'R' } as const;
const rows = [
  ['t0', 'H'],
  ['t1', 'bloch(109.47deg, 0deg)'],
  ['t2', 'bloch(109.47deg, 120deg)'],
  ['t3', 'bloch(109.47deg, 240deg)'],
] as const;

/** A version of two plates and four targets, its dials from the product's own solver. Names are invented. */
export function makeVersion(repeats = 1): Version {
  const plates = [plate(31, 'H-3', 'half', 179.3, 12.4, 1), plate(32, 'Q-B', 'quarter', 89.2, 301.7, -1)];
  const read = benchProblem({ ...light, plates }, convention, task);
  if (!read.ok) throw new Error(read.error.message);
  const targets = Array.from({ length: repeats }).flatMap((_, repeat) =>
    rows.map(([label, expression], index) => {
      const row = solveRow(expression, read.problem, convention, null);
      if (row.status !== 'solved') throw new Error(`${expression} cannot be read`);
      const choice = chooseSolution({ solved: row.solved, heldFastAxesDeg: null });
      return frozenTarget({ id: id(500 + repeat * rows.length + index), label, expression }, row, choice);
    }),
  );
  return versionSchema.parse({
    summary: {
      id: id(140),
      protocolId,
      protocolName: 'Tetrahedron, signal arm',
      number: 14,
      message: 'after the new scan of Q-B',
      contentHash: '5c1f0e'.padEnd(64, '0'),
      targetCount: targets.length,
      savedAt: at,
      savedBy: 'Ines Okafor',
    },
    content: {
      format: 'quarterturn.version/3',
      lab: { id: labId, name: 'Harbour Street photonics' },
      protocol: { id: protocolId, name: 'Tetrahedron, signal arm', purpose: '' },
      number: 14,
      parentHash: null,
      message: 'after the new scan of Q-B',
      savedAt: at,
      savedBy: { id: id(9), name: 'Ines Okafor' },
      convention,
      solverVersion: '2.0.0',
      ...task,
      toleranceInfidelity: 1e-3,
      bench: {
        id: id(7),
        name: 'heralded bench',
        wavelengthNm: light.wavelengthNm,
        wavelengthSigmaNm: light.wavelengthSigmaNm,
        temperatureC: light.temperatureC,
        temperatureSigmaK: light.temperatureSigmaK,
        laserClass: '3B',
        hazardWavelengthsNm: [405, 810],
        input: {
          expression: light.inputExpression,
          stokes: [1, 0, 0],
          polariserSigmaDeg: light.polariserSigmaDeg,
          polariserExtinction: light.polariserExtinction,
        },
        plates,
      },
      targets,
    },
    canonicalJson: '{}',
    parentHash: null,
  });
}

/** A run of it that has just begun, its dials at the given readings. */
export function makeRun(version: Version, startDialsDeg: Run['startDialsDeg'] = [40, 156.7]): Run {
  return {
    summary: {
      id: runId,
      number: 231,
      state: 'running',
      protocolId,
      protocolName: version.summary.protocolName,
      versionId: version.summary.id,
      versionNumber: version.summary.number,
      benchName: version.content.bench.name,
      settingCount: version.content.targets.length,
      doneCount: 0,
      skippedCount: 0,
      pauseNote: '',
      startedAt: at,
      startedBy: 'Jonas Brandt',
      finishedAt: null,
    },
    startDialsDeg,
    readings: [],
    voids: [],
  };
}
