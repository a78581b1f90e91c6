import type { ProtocolKind } from '../../../shared/schemas/protocols';

export type ErrorKind = 'retardance' | 'wavelength';

/** The question as it is typed: every field a text, so that what can't be read stays as it was. */
export interface RobustForm {
  readonly kind: ProtocolKind;
  readonly targets: Readonly<Record<ProtocolKind, string>>;
  /** The light before typed plates; a bench brings its own. */
  readonly input: string;
  /** A bench's id; null for typed plates. */
  readonly benchId: string | null;
  readonly plates: string;
  readonly error: ErrorKind;
  /** Per cent, and nm. */
  readonly widths: Readonly<Record<ErrorKind, string>>;
  readonly starts: string;
  readonly seed: string;
  readonly tolerance: string;
}

export const FIRST_FORM: RobustForm = {
  kind: 'apply',
  targets: { prepare: '(H + i V)/sqrt(2)', apply: 'X' },
  input: 'H',
  benchId: null,
  plates: '180 180 180',
  error: 'retardance',
  widths: { retardance: '10', wavelength: '5' },
  starts: '40',
  seed: '1',
  tolerance: '1e-3',
};

/** Whether an address asks a whole question, which the page then answers at once. */
export function asksQuestion(search: URLSearchParams): boolean {
  return search.has('unitary') || search.has('state');
}

export function formOf(search: URLSearchParams): RobustForm {
  const unitary = search.get('unitary');
  const state = search.get('state');
  const error: ErrorKind = search.get('against') === 'wavelength' ? 'wavelength' : 'retardance';
  const kind: ProtocolKind = unitary === null && state !== null ? 'prepare' : 'apply';
  const typed = (name: string, otherwise: string) => search.get(name) ?? otherwise;
  return {
    kind,
    targets: {
      prepare: state ?? FIRST_FORM.targets.prepare,
      apply: unitary ?? FIRST_FORM.targets.apply,
    },
    input: typed('from', FIRST_FORM.input),
    benchId: search.get('bench'),
    plates: typed('plates', FIRST_FORM.plates),
    error,
    widths: { ...FIRST_FORM.widths, [error]: typed('within', FIRST_FORM.widths[error]) },
    starts: typed('starts', FIRST_FORM.starts),
    seed: typed('seed', FIRST_FORM.seed),
    tolerance: typed('tolerance', FIRST_FORM.tolerance),
  };
}

/** The address of a question; what it does not ask is left out. `formOf` reads it back. */
export function searchOf(form: RobustForm): URLSearchParams {
  const { kind, targets, input, benchId, plates, error, widths, starts, seed, tolerance } = form;
  const search = new URLSearchParams({ [kind === 'apply' ? 'unitary' : 'state']: targets[kind] });
  if (benchId !== null) search.set('bench', benchId);
  else {
    search.set('plates', plates);
    if (kind === 'prepare') search.set('from', input);
  }
  search.set('against', error);
  search.set('within', widths[error]);
  search.set('starts', starts);
  search.set('seed', seed);
  search.set('tolerance', tolerance);
  return search;
}
