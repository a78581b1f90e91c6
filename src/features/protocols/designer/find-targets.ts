import type { DraftTarget } from '../../../../shared/schemas/protocols';

/** Places of the targets whose label or expression holds the text, in any case, and of the row with that number. */
export function findTargets(targets: readonly DraftTarget[], text: string): readonly number[] {
  const sought = text.trim().toLowerCase();
  if (sought === '') return [];
  return targets.flatMap(({ label, expression }, place) =>
    String(place + 1) === sought ||
    label.toLowerCase().includes(sought) ||
    expression.toLowerCase().includes(sought)
      ? [place]
      : [],
  );
}

/** Which of the found places to go to first: the row called so, the row of that number, else the next from where one is. */
export function firstFound(
  targets: readonly DraftTarget[],
  text: string,
  found: readonly number[],
  here: number,
): number | undefined {
  const sought = text.trim().toLowerCase();
  return (
    found.find((place) => targets[place]?.label.toLowerCase() === sought) ??
    found.find((place) => String(place + 1) === sought) ??
    found.find((place) => place >= here) ??
    found[0]
  );
}

/** The found place after or before another, going round at the ends. */
export function nextFound(found: readonly number[], here: number, by: 1 | -1): number | undefined {
  return by === 1
    ? (found.find((place) => place > here) ?? found[0])
    : (found.findLast((place) => place < here) ?? found.at(-1));
}
