import type { SphereInput } from './scene';

/** What the ticks, flags and patterns of this drawing mean: the first fits the drawing's corner, the rest stand under it. */
export function figureNotes({ plates, phase, reach, images }: SphereInput): string[] {
  const hasPath = plates.length > 0;
  return [
    ...(hasPath ? ['a tick every 10° of turn'] : []),
    ...(hasPath && phase === true ? ['pennant from hairline: phase'] : []),
    ...(images !== undefined && images.length > 0 ? ['reticle: wanted; dot: reached'] : []),
    ...(reach === undefined ? [] : reachNotes(reach.cells)),
  ];
}

function reachNotes(cells: readonly { readonly count: number }[]): string[] {
  return [
    ...(cells.some(({ count }) => count === 0) ? ['hatched: out of reach'] : []),
    ...(cells.some(({ count }) => count === 2) ? ['dotted: in two ways'] : []),
  ];
}
