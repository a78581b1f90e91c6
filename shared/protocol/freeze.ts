import { notReadySentences } from '../bench-ready';
import type { Bench } from '../schemas/benches';
import type { Plate } from '../schemas/cabinet';
import type { Lab } from '../schemas/labs';
import type { DraftContent, DraftTarget } from '../schemas/protocols';
import type { FrozenGoal, FrozenPlate, FrozenTarget, VersionContent } from '../schemas/versions';
import { finish } from '../optics/sequence';
import { SOLVER_VERSION } from '../optics/solve-target';
import { canonicalJson, contentHash } from './canonical-json';
import { chooseSolutionsSteps, chosenSolution, type RowChoice, whyUnplanned } from './choose-solutions';
import { rowName } from './row-name';
import { benchProblem, type RowReading, type RowResult, solveRow } from './solve-row';
import { usedRetardance } from './solving-plates';

/** Everything that a version is made of, as it stands at this moment. */
export interface FreezeInput {
  readonly lab: Pick<Lab, 'id' | 'name' | 'convention'>;
  readonly protocolId: string;
  readonly draft: DraftContent;
  readonly bench: Bench;
  readonly number: number;
  /** The content hash of the version before this one; null for the first. */
  readonly parentHash: string | null;
  readonly message: string;
  readonly savedAt: Date;
  readonly savedBy: { readonly id: string; readonly name: string };
}

/** What keeps a draft from being frozen: where, and one sentence. */
export interface FreezeFault {
  /** Dotted, as in `targets.2.expression`. */
  readonly path: string;
  readonly message: string;
}

export type Frozen =
  | {
      readonly ok: true;
      readonly content: VersionContent;
      /** RFC 8785: the text that the hash covers. */
      readonly canonicalJson: string;
      /** SHA-256 of that text; since the text holds the parent's hash, it covers the whole chain. */
      readonly contentHash: string;
    }
  | { readonly ok: false; readonly faults: readonly FreezeFault[] };

/** A draft solved for its bench and frozen with all that the numbers depend on, or every row that cannot be. */
export function freeze(input: FreezeInput): Frozen {
  return finish(freezeSteps(input));
}

/** `freeze` a row at a time, for a server that answers others between two rows: many plates take tens of milliseconds each. */
export function* freezeSteps(input: FreezeInput): Generator<undefined, Frozen> {
  const { lab, draft, bench } = input;
  const faults: FreezeFault[] = [];
  if (draft.targets.length === 0) {
    return {
      ok: false,
      faults: [{ path: 'targets', message: 'The protocol has no target. Write one first.' }],
    };
  }
  const waits = notReadySentences(bench, 'preparation');
  if (waits.length > 0) return { ok: false, faults: waits.map((message) => ({ path: 'benchId', message })) };
  const faced = benchProblem(bench, lab.convention, draft);
  if (!faced.ok) {
    const message = `The input of ${bench.name} cannot be read. Column ${faced.error.column}: ${faced.error.message}`;
    return { ok: false, faults: [{ path: 'benchId', message }] };
  }
  const solvedRows: { readonly row: DraftTarget; readonly result: SolvedRow }[] = [];
  for (const [index, row] of draft.targets.entries()) {
    const name = rowName(index, row.label);
    if (!row.label.isWellFormed() || !row.expression.isWellFormed()) {
      faults.push({
        path: `targets.${index}.expression`,
        message: `${name} holds half of a character. Write it again.`,
      });
      continue;
    }
    yield;
    const result = solveRow(row.expression, faced.problem, lab.convention, row.heldFastAxesDeg);
    if (result.status === 'unreadable') {
      faults.push({
        path: `targets.${index}.expression`,
        message: `${name}, column ${result.error.column}: ${result.error.message}`,
      });
      continue;
    }
    solvedRows.push({ row, result });
  }
  if (faults.length > 0) return { ok: false, faults };
  const { choices, unplanned } = yield* chooseSolutionsSteps(
    solvedRows.map(({ row, result }) => ({ ...result, heldFastAxesDeg: row.heldFastAxesDeg })),
    faced.problem,
  );
  if (unplanned !== null) {
    const { row, plate } = unplanned;
    const plateName = plate === null ? null : (bench.plates[plate]?.name ?? `plate ${plate + 1}`);
    const message = whyUnplanned(rowName(row, draft.targets[row]?.label ?? ''), plateName);
    return { ok: false, faults: [{ path: `targets.${row}`, message }] };
  }
  const targets = solvedRows.flatMap(({ row, result }, place) => {
    const choice = choices[place];
    return choice === undefined ? [] : [frozenTarget(row, result, choice)];
  });

  const content: VersionContent = {
    format: 'quarterturn.version/3',
    lab: { id: lab.id, name: lab.name },
    protocol: { id: input.protocolId, name: draft.name, purpose: draft.purpose },
    number: input.number,
    parentHash: input.parentHash,
    message: input.message,
    savedAt: input.savedAt.toISOString(),
    savedBy: { id: input.savedBy.id, name: input.savedBy.name },
    convention: lab.convention,
    solverVersion: SOLVER_VERSION,
    kind: draft.kind,
    objective: draft.objective,
    // As they were used: dials of other plates than the bench has now stand for nothing.
    presentDialsDeg: faced.problem.presentDialsDeg === null ? null : [...faced.problem.presentDialsDeg],
    toleranceInfidelity: draft.toleranceInfidelity,
    bench: {
      id: bench.id,
      name: bench.name,
      wavelengthNm: bench.wavelengthNm,
      wavelengthSigmaNm: bench.wavelengthSigmaNm,
      temperatureC: bench.temperatureC,
      temperatureSigmaK: bench.temperatureSigmaK,
      laserClass: bench.laserClass,
      hazardWavelengthsNm: [...bench.hazardWavelengthsNm],
      input: {
        expression: bench.inputExpression,
        stokes: [...faced.problem.input],
        polariserSigmaDeg: bench.polariserSigmaDeg,
        polariserExtinction: bench.polariserExtinction,
      },
      plates: bench.plates.map((plate) => frozenPlate(plate, bench)),
    },
    targets,
  };
  const text = canonicalJson(content);
  return { ok: true, content, canonicalJson: text, contentHash: contentHash(text) };
}

type SolvedRow = Extract<RowResult, { status: 'solved' }>;

function frozenPlate(plate: Plate, bench: Bench): FrozenPlate {
  const { id, name, kind, designWavelengthNm, construction, material, order, mount, calibration } = plate;
  const { retardanceDeg, shiftDeg, source, perNmDeg, perKelvinDeg } = usedRetardance(plate, bench);
  const used = { retardanceDeg, shiftDeg, source, perNmDeg, perKelvinDeg };
  return { id, name, kind, designWavelengthNm, construction, material, order, mount, calibration, used };
}

function frozenGoal(reading: RowReading): FrozenGoal {
  if (reading.kind === 'state') return { kind: 'state', stokes: [...reading.stokes] };
  const { w, x, y, z } = reading.quaternion;
  return { kind: 'unitary', quaternion: [w, x, y, z] };
}

/** A solved row as a version keeps it, its chosen solution with the readings chosen for it. */
export function frozenTarget(
  row: Pick<DraftTarget, 'id' | 'label' | 'expression'>,
  { reading, solved }: SolvedRow,
  choice: RowChoice,
): FrozenTarget {
  return {
    id: row.id,
    label: row.label.trim(),
    expression: row.expression,
    canonicalExpression: reading.canonical,
    goal: frozenGoal(reading),
    reach: solved.kind,
    shortfallDeg: solved.shortfallDeg,
    freePlates: [...solved.freePlates],
    solutions: solved.solutions.map((listed, index) => {
      const solution = (index === choice.index ? chosenSolution(solved, choice) : undefined) ?? listed;
      return {
        fastAxesDeg: [...solution.fastAxesDeg],
        dialsDeg: [...solution.dialsDeg],
        infidelity: solution.infidelity,
        dialledInfidelity: solution.dialledInfidelity,
        expectedInfidelity: solution.expectedInfidelity,
        expectedLow: solution.expectedLow,
        expectedHigh: solution.expectedHigh,
      };
    }),
    chosenSolution: choice.index,
    held: choice.held,
  };
}
