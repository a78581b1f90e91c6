import { notReadySentences } from '../../../shared/bench-ready';
import { degrees, parseState, type Stokes, toRadians } from '../../../shared/optics';
import type { Convention } from '../../../shared/optics/convention';
import type { DialScale } from '../../../shared/optics/dial';
import type { ExpressionProblem } from '../../../shared/optics/expression';
import type { Goal } from '../../../shared/optics/goal';
import type { TargetProblem } from '../../../shared/optics/solve-target';
import { STOKES_H } from '../../../shared/optics/stokes';
import { benchProblem, readRow, rowGoal, type RowReading } from '../../../shared/protocol/solve-row';
import type { Bench } from '../../../shared/schemas/benches';
import { readTypedNumber } from '../../lib/forms';
import type { RobustQuestion } from '../../workers/robust-study';
import type { ErrorKind, RobustForm } from './robust-form';
import { plateCountFault, readTypedPlates } from './typed-plates';
import { wavelengthSlopes } from './wavelength-slopes';

/** A plate as the page names it. */
export interface AskedPlate {
  readonly name: string;
  readonly retardanceDeg: number;
  /** How its mount is engraved; null for a plate that is only typed. */
  readonly scale: DialScale | null;
}

/** A question as it was read, with all that its answers are shown with. */
export interface AskedQuestion {
  readonly question: RobustQuestion;
  readonly plates: readonly AskedPlate[];
  readonly reading: RowReading;
  readonly source: string;
  readonly error: ErrorKind;
  readonly benchName: string | null;
}

/** What is wrong, by the field it stands at. */
export interface QuestionFaults {
  readonly target?: ExpressionProblem;
  readonly input?: ExpressionProblem;
  readonly plates?: string;
  readonly bench?: string;
  readonly error?: string;
  readonly width?: string;
  readonly starts?: string;
  readonly seed?: string;
}

export type ReadQuestion =
  | { readonly ok: true; readonly asked: AskedQuestion }
  | { readonly ok: false; readonly faults: QuestionFaults };

const LARGEST_WIDTH = { retardance: 50, wavelength: 200 } as const;
const MOST_STARTS = 500;

/** @param bench the chosen bench, undefined when the form's is not among the lab's. */
export function readQuestion(
  form: RobustForm,
  bench: Bench | undefined,
  convention: Convention,
): ReadQuestion {
  const source = form.targets[form.kind];
  const target = readRow(source, form.kind, convention);
  const stack = form.benchId === null ? typedStack(form, convention) : benchStack(form, bench, convention);
  const width = readTypedNumber(form.widths[form.error]);
  const starts = readTypedNumber(form.starts);
  const seed = readTypedNumber(form.seed);
  const faults: QuestionFaults = {
    ...(target.ok ? {} : { target: target.error }),
    ...(stack.ok ? {} : stack.faults),
    ...widthFault(width, form.error),
    ...(Number.isInteger(starts) && starts > 0 && starts <= MOST_STARTS
      ? {}
      : { starts: `Write a whole number from 1 to ${MOST_STARTS}.` }),
    ...(Number.isSafeInteger(seed) && seed >= 0 ? {} : { seed: 'Write a whole number from 0.' }),
  };
  if (!target.ok || !stack.ok || Object.keys(faults).length > 0) return { ok: false, faults };
  const goal = rowGoal(target.reading, stack.input);
  return {
    ok: true,
    asked: {
      question: {
        problem: {
          goal,
          retardancesRad: stack.plates.map(({ retardanceDeg }) => toRadians(degrees(retardanceDeg))),
          errorPerUnitRad: stack.errorPerUnitRad,
          width: form.error === 'retardance' ? width / 100 : width,
          starts,
          seed,
          // The page draws its own curves, of the setting that is looked at.
          curveAt: [],
        },
        standing: stack.standing(goal),
      },
      plates: stack.plates,
      reading: target.reading,
      source,
      error: form.error,
      benchName: stack.benchName,
    },
  };
}

function widthFault(width: number, error: ErrorKind): QuestionFaults {
  const largest = LARGEST_WIDTH[error];
  if (width > 0 && width <= largest) return {};
  return { width: `Write a range above 0 and at most ${largest}${error === 'retardance' ? ' %' : ' nm'}.` };
}

type Stack =
  | {
      readonly ok: true;
      readonly plates: readonly AskedPlate[];
      readonly errorPerUnitRad: readonly number[];
      readonly input: Stokes;
      readonly benchName: string | null;
      readonly standing: (goal: Goal) => TargetProblem | null;
    }
  | { readonly ok: false; readonly faults: QuestionFaults };

function typedStack({ kind, plates, input, error }: RobustForm, convention: Convention): Stack {
  const typed = readTypedPlates(plates);
  const light = parseState(input, convention);
  const inputFault = kind === 'prepare' && !light.ok ? { input: light.error } : {};
  const errorFault =
    error === 'wavelength'
      ? {
          error:
            'Plates typed by retardance tell nothing about wavelength. Choose a bench’s plates, or ask about a common retardance error.',
        }
      : {};
  if (!typed.ok) return { ok: false, faults: { plates: typed.sentence, ...inputFault, ...errorFault } };
  if (Object.keys(inputFault).length + Object.keys(errorFault).length > 0) {
    return { ok: false, faults: { ...inputFault, ...errorFault } };
  }
  return {
    ok: true,
    plates: typed.retardancesDeg.map((retardanceDeg, k) => ({
      name: `plate ${k + 1}`,
      retardanceDeg,
      scale: null,
    })),
    errorPerUnitRad: typed.retardancesDeg.map((retardanceDeg) => toRadians(degrees(retardanceDeg))),
    // A unitary asks nothing about the light before it.
    input: light.ok ? light.stokes : STOKES_H,
    benchName: null,
    standing: () => null,
  };
}

function benchStack({ kind, error }: RobustForm, bench: Bench | undefined, convention: Convention): Stack {
  if (bench === undefined) {
    return {
      ok: false,
      faults: { bench: 'This bench is not among the lab’s, or it is retired. Choose another.' },
    };
  }
  const waits = notReadySentences(bench, 'preparation');
  if (waits.length > 0) return { ok: false, faults: { bench: waits.join(' ') } };
  const count = plateCountFault(bench.plates.length);
  if (count !== null) return { ok: false, faults: { bench: `${bench.name}: ${count}` } };
  const read = benchProblem(bench, convention, {
    kind,
    objective: 'least-expected-infidelity',
    presentDialsDeg: null,
  });
  if (!read.ok) {
    const { column, message } = read.error;
    return {
      ok: false,
      faults: { bench: `The bench’s own input state can’t be read. Column ${column}: ${message}` },
    };
  }
  const { problem } = read;
  const retardancesRad = problem.plates.map(({ retardanceDeg }) => toRadians(degrees(retardanceDeg)));
  const slopes = error === 'wavelength' ? wavelengthSlopes(bench) : null;
  if (slopes?.ok === false) return { ok: false, faults: { error: slopes.sentence } };
  return {
    ok: true,
    plates: problem.plates.map(({ retardanceDeg, scale }, k) => ({
      name: bench.plates[k]?.name ?? `plate ${k + 1}`,
      retardanceDeg,
      scale,
    })),
    errorPerUnitRad: slopes?.perNmRad ?? retardancesRad,
    input: problem.input,
    benchName: bench.name,
    standing: (goal) => ({ ...problem, goal, heldFastAxesDeg: null }),
  };
}
