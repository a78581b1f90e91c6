import type { Convention } from '../../shared/optics/convention';
import type { SpherePointInput } from './scene';
import { MOST_NAMED_POINTS } from './scene-points';
import { stateInWords } from './state-words';

/** The first of a set in words, and how many more there are. */
export function pointsInWords(
  points: readonly SpherePointInput[],
  convention: Convention,
): { readonly named: readonly { readonly label: string; readonly text: string }[]; readonly more: number } {
  return {
    named: points
      .slice(0, MOST_NAMED_POINTS)
      .map(({ label, state }) => ({ label, text: stateInWords(state, convention) })),
    more: Math.max(0, points.length - MOST_NAMED_POINTS),
  };
}

/** The set in one sentence; a label that is the state's own letter isn't explained by itself. */
export function pointsSummary(points: readonly SpherePointInput[], convention: Convention): string[] {
  if (points.length === 0) return [];
  const { named, more } = pointsInWords(points, convention);
  const list = named.map(({ label, text }) => (label === text ? label : `${label}, ${text}`)).join('; ');
  const rest = more > 0 ? `; and ${more} more` : '';
  return [`${points.length === 1 ? 'One state' : `${points.length} states`}: ${list}${rest}.`];
}
