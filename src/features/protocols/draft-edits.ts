import { v7 as newId } from 'uuid';
import {
  type DraftContent,
  type DraftTarget,
  maxTargets,
  type Objective,
} from '../../../shared/schemas/protocols';

/** One change of a draft, as data: what it does to the content, and which typing it continues. */
export interface DraftEdit {
  /** Edits in a row with the same key are undone as one; null never joins. */
  readonly typing: string | null;
  readonly apply: (content: DraftContent) => DraftContent;
}

function withTargets(
  typing: string | null,
  change: (targets: readonly DraftTarget[]) => readonly DraftTarget[],
): DraftEdit {
  return { typing, apply: (content) => ({ ...content, targets: [...change(content.targets)] }) };
}

function changeTarget(typing: string | null, id: string, change: Partial<DraftTarget>): DraftEdit {
  return withTargets(typing, (targets) =>
    targets.map((target) => (target.id === id ? { ...target, ...change } : target)),
  );
}

/** A held solution belongs to the state that was written; another state starts unheld. */
export const writeExpression = (id: string, expression: string): DraftEdit =>
  changeTarget(`expression ${id}`, id, { expression, heldFastAxesDeg: null });

export const writeLabel = (id: string, label: string): DraftEdit =>
  changeTarget(`label ${id}`, id, { label });

/** Puts a row back as it was before its source was opened. */
export const restoreTarget = (target: DraftTarget): DraftEdit => changeTarget(null, target.id, target);

export const holdSolution = (id: string, fastAxesDeg: readonly number[] | null): DraftEdit =>
  changeTarget(null, id, { heldFastAxesDeg: fastAxesDeg === null ? null : [...fastAxesDeg] });

export function newTarget(targets: readonly DraftTarget[], expression: string): DraftTarget {
  return {
    id: newId(),
    label: freeLabel(new Set(targets.map(({ label }) => label))),
    expression,
    heldFastAxesDeg: null,
  };
}

/** Rows for several targets at once; a label that is empty or taken gets a free one. */
export function newTargets(
  targets: readonly DraftTarget[],
  rows: readonly { readonly label: string; readonly expression: string }[],
): readonly DraftTarget[] {
  const labels = labelsFor(targets, rows);
  return rows.map(({ label, expression }, place) => ({
    id: newId(),
    label: labels[place] ?? label,
    expression,
    heldFastAxesDeg: null,
  }));
}

/** The labels that rows get as they are added: their own, or a free one where it is empty or taken. */
export function labelsFor(
  targets: readonly { readonly label: string }[],
  rows: readonly { readonly label: string }[],
): readonly string[] {
  const taken = new Set(targets.map(({ label }) => label));
  return rows.map(({ label }) => {
    const free = label === '' || taken.has(label) ? freeLabel(taken) : label;
    taken.add(free);
    return free;
  });
}

/** t0, t1, … the first that no row has. */
function freeLabel(taken: ReadonlySet<string>): string {
  let number = 0;
  while (taken.has(`t${number}`)) number += 1;
  return `t${number}`;
}

export const addTarget = (target: DraftTarget): DraftEdit =>
  withTargets(`expression ${target.id}`, (targets) =>
    targets.length < maxTargets ? [...targets, target] : targets,
  );

export const removeTarget = (id: string): DraftEdit =>
  withTargets(null, (targets) => targets.filter((target) => target.id !== id));

/** Moves a row by `by` places, as far as the table goes. */
export const moveTarget = (id: string, by: number): DraftEdit =>
  withTargets(null, (targets) => {
    const from = targets.findIndex((target) => target.id === id);
    const moved = targets[from];
    const to = Math.min(Math.max(from + by, 0), targets.length - 1);
    if (moved === undefined || to === from) return targets;
    const rest = targets.filter((target) => target.id !== id);
    return [...rest.slice(0, to), moved, ...rest.slice(to)];
  });

export const rename = (name: string): DraftEdit => ({
  typing: 'name',
  apply: (content) => ({ ...content, name }),
});

export const describePurpose = (purpose: string): DraftEdit => ({
  typing: 'purpose',
  apply: (content) => ({ ...content, purpose }),
});

export const setTolerance = (toleranceInfidelity: number): DraftEdit => ({
  typing: 'tolerance',
  apply: (content) => ({ ...content, toleranceInfidelity }),
});

/** Solutions are held for the plates of one bench: on another they mean nothing. */
export const chooseBench = (benchId: string): DraftEdit => ({
  typing: null,
  apply: (content) => ({
    ...content,
    benchId,
    presentDialsDeg: null,
    targets: content.targets.map((target) => ({ ...target, heldFastAxesDeg: null })),
  }),
});

export const rankBy = (objective: Objective): DraftEdit => ({
  typing: null,
  apply: (content) => ({ ...content, objective }),
});

export const standAt = (presentDialsDeg: readonly number[] | null): DraftEdit => ({
  typing: null,
  apply: (content) => ({
    ...content,
    presentDialsDeg: presentDialsDeg === null ? null : [...presentDialsDeg],
  }),
});

/** Several rows at once, as from a set or a file; undone as one. What does not fit any more is left out. */
export const addRows = (rows: readonly DraftTarget[]): DraftEdit =>
  withTargets(null, (targets) => [...targets, ...rows].slice(0, maxTargets));

/** The rows in another order, by their ids; a row that is not named keeps its place at the end. */
const reorder = (ids: readonly string[]): DraftEdit =>
  withTargets(null, (targets) => {
    const place = new Map(ids.map((id, index) => [id, index]));
    return [...targets].sort(
      (a, b) => (place.get(a.id) ?? targets.length) - (place.get(b.id) ?? targets.length),
    );
  });

/** The rows in a planned order, ranked by the travel that it was planned for; undone as one. */
export const takeOrder = (ids: readonly string[]): DraftEdit => ({
  typing: null,
  apply: (content) => rankBy('least-travel').apply(reorder(ids).apply(content)),
});

/** The rows in a planned order with each planned solution held; undone as one. */
export const takeHeld = (
  rows: readonly { readonly id: string; readonly fastAxesDeg: readonly number[] | null }[],
): DraftEdit => ({
  typing: null,
  apply: (content) =>
    rows.reduce(
      (now, { id, fastAxesDeg }) => holdSolution(id, fastAxesDeg).apply(now),
      reorder(rows.map(({ id }) => id)).apply(content),
    ),
});
