import { randomUUID } from 'node:crypto';
import { z } from 'zod';
import type { Role } from '../../../shared/permissions';
import {
  acceptedInvitationSchema,
  benchSchema,
  type CalibrationInput,
  cabinetMountSchema,
  cabinetPlateSchema,
  type CreatePlate,
  createdInvitationSchema,
  type DraftContent,
  fileSchema,
  labSchema,
  type Protocol,
  protocolSchema,
  type RecordScan,
  runSchema,
  type ShownSolution,
  type VersionSummary,
  versionSummarySchema,
} from '../../../shared/schemas';
import { chooseSolutions, chosenSolution } from '../../../shared/protocol/choose-solutions';
import { benchProblem, solveRow } from '../../../shared/protocol/solve-row';
import {
  draft,
  LIGHT,
  newCalibration,
  newMount,
  newPlate,
  type NewPlateChange,
  target as anyTarget,
} from '../../support/plates';
import { answered, call, upload } from './calls';
import type { Agent } from './harness';

/** Where our own page would be: all that a call needs to know of the server. */
type Us = Parameters<typeof call>[0];

const measuredAt = '2026-06-01T10:00:00Z';

export function plateBody(name: string, change: NewPlateChange = {}): CreatePlate {
  const { mount, calibration, ...other } = change;
  return newPlate({
    name,
    designWavelengthNm: 808,
    mount: { name: `M ${name}`, repeatabilityDeg: 0.06, ...mount },
    calibration: { measuredAt, ...calibration },
    ...other,
  });
}

export const calibrationBody = (change: Partial<CalibrationInput> = {}): CalibrationInput =>
  newCalibration({ measuredAt, ...change });

const quarter = { retardanceDeg: 86.9, offsetDeg: 301.73 };

export const quarterBody = (name: string): CreatePlate =>
  plateBody(name, { kind: 'quarter', mount: { direction: -1 }, calibration: quarter });

export const quarterCalibration = (change: Partial<CalibrationInput> = {}): CalibrationInput =>
  calibrationBody({ ...quarter, ...change });

/** A scan as the page records it; of which file and with which numbers is the lab's and the fit's. */
export function scanBody(fileId: string): RecordScan {
  return {
    fileId,
    columns: {
      dial: { column: 0, unit: null },
      crossed: { column: 1, unit: null },
      parallel: null,
      crossedSigma: null,
      parallelSigma: null,
    },
    light: { kind: 'linear', extinction: null, power: null },
    leftOut: [],
    wavelengthNm: 810,
    temperatureC: null,
    measuredAt,
    note: '',
    settlesId: null,
    shown: { offsetDeg: 12.4, retardanceDeg: null },
  };
}

export function benchBody(plateIds: readonly string[], name = 'signal arm') {
  return {
    name,
    ...LIGHT,
    laserClass: '3B' as const,
    hazardWavelengthsNm: [405, 810],
    plateIds: [...plateIds],
    analysisPlateIds: [],
    detectors: { passed: null, rejected: null, efficiencyRatio: null },
  };
}

export const target = (label: string, expression: string): DraftContent['targets'][number] =>
  anyTarget({ id: randomUUID(), label, expression });

/** A lab with something of everything, made through the API. */
export interface TestLab {
  readonly labId: string;
  readonly plateIds: readonly [string, string];
  readonly sparePlateId: string;
  /** Of the spare plate, written by hand. */
  readonly calibrationId: string;
  /** Empty. */
  readonly spareMountId: string;
  /** A text that the first plate has as its data sheet. */
  readonly fileId: string;
  readonly benchId: string;
  readonly protocolId: string;
  readonly version: VersionSummary;
  readonly runId: string;
  readonly invitationId: string;
  readonly invitationToken: string;
}

export async function makeLab(harness: Us, lead: Agent, name: string): Promise<TestLab> {
  const post = <S extends z.ZodType>(path: string, body: unknown, schema: S) =>
    answered(call(harness, lead, 'post', path, { body }), schema);
  const { id: labId } = await post('/labs', { name }, labSchema);
  const first = await post(`/labs/${labId}/plates`, plateBody('H-3'), cabinetPlateSchema);
  const second = await post(`/labs/${labId}/plates`, quarterBody('Q-B'), cabinetPlateSchema);
  const spare = await post(`/labs/${labId}/plates`, plateBody('H-9'), cabinetPlateSchema);
  const spareMount = await post(`/labs/${labId}/mounts`, newMount({ name: 'M-S' }), cabinetMountSchema);
  const file = await answered(
    upload(harness, lead, `/labs/${labId}/files`, 'angle,power\n0,1\n'),
    fileSchema,
  );
  const sheet = { fileId: file.id, kind: 'data-sheet' };
  await post(`/labs/${labId}/plates/${first.id}/files`, sheet, z.unknown());
  const bench = await post(`/labs/${labId}/benches`, benchBody([first.id, second.id]), benchSchema);
  const protocol = await post(
    `/labs/${labId}/protocols`,
    draft({
      name: 'Two states',
      benchId: bench.id,
      targets: [target('t1', 'H'), target('t2', '(H + i V)/sqrt(2)')],
    }),
    protocolSchema,
  );
  const version = await saveVersion(harness, lead, labId, protocol);
  const run = await post(
    `/labs/${labId}/runs`,
    {
      versionId: version.id,
      startDialsDeg: [null, 12.5],
      cautionAcknowledged: true,
      staleAcknowledged: false,
    },
    runSchema,
  );
  const created = await post(
    `/labs/${labId}/invitations`,
    { role: 'guest', note: 'nobody yet' },
    createdInvitationSchema,
  );
  return {
    labId,
    plateIds: [first.id, second.id],
    sparePlateId: spare.id,
    calibrationId: spare.calibration?.id ?? '',
    spareMountId: spareMount.id,
    fileId: file.id,
    benchId: bench.id,
    protocolId: protocol.id,
    version,
    runId: run.summary.id,
    invitationId: created.invitation.id,
    invitationToken: created.token,
  };
}

/** Invites someone and lets them accept. */
export async function join(
  harness: Us,
  lead: Agent,
  labId: string,
  person: Agent,
  role: Role,
): Promise<void> {
  const { token } = await answered(
    call(harness, lead, 'post', `/labs/${labId}/invitations`, { body: { role, note: 'by the tests' } }),
    createdInvitationSchema,
  );
  await answered(call(harness, person, 'post', `/invitations/${token}/accept`), acceptedInvitationSchema);
}

/** What the page would have shown: the same solver on the same bench. */
export async function shownFor(
  harness: Us,
  agent: Agent,
  labId: string,
  content: DraftContent,
): Promise<ShownSolution[]> {
  const lab = await answered(call(harness, agent, 'get', `/labs/${labId}`), labSchema);
  const bench = await answered(
    call(harness, agent, 'get', `/labs/${labId}/benches/${content.benchId}`),
    benchSchema,
  );
  const faced = benchProblem(bench, lab.convention, content);
  if (!faced.ok) throw new Error(faced.error.message);
  const rows = content.targets.map((row) => {
    const result = solveRow(row.expression, faced.problem, lab.convention, row.heldFastAxesDeg);
    if (result.status === 'unreadable') throw new Error(result.error.message);
    return { ...result, id: row.id, heldFastAxesDeg: row.heldFastAxesDeg };
  });
  const { choices } = chooseSolutions(rows, faced.problem);
  return rows.map(({ id, solved }, place) => {
    const choice = choices[place];
    const solution = choice === undefined ? undefined : chosenSolution(solved, choice);
    if (solution === undefined) throw new Error('a solved row has a solution');
    return {
      targetId: id,
      fastAxesDeg: [...solution.fastAxesDeg],
      dialsDeg: [...solution.dialsDeg],
      infidelity: solution.infidelity,
      dialledInfidelity: solution.dialledInfidelity,
    };
  });
}

export async function saveVersion(
  harness: Us,
  agent: Agent,
  labId: string,
  protocol: Protocol,
  message = 'As measured today.',
): Promise<VersionSummary> {
  const shown = await shownFor(harness, agent, labId, protocol.draft.content);
  return answered(
    call(harness, agent, 'post', `/labs/${labId}/protocols/${protocol.id}/versions`, {
      body: { message, shown },
      ifMatch: `"r${protocol.draft.revision}"`,
    }),
    versionSummarySchema,
  );
}
