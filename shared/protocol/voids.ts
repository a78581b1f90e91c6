import type { Bench } from '../schemas/benches';
import type { VoidDials } from '../schemas/reliance';
import type { FrozenPlate, VersionContent } from '../schemas/versions';

/**
 * Why dials of a version stand for nothing at its bench as it stands now.
 * @param now.unseatedPlateIds those of its plates that have left the seat in which the version's zero was measured.
 */
export function voidsOf(
  content: VersionContent,
  now: { readonly bench: Bench; readonly unseatedPlateIds: ReadonlySet<string> },
): VoidDials[] {
  const before = content.bench.plates;
  const after = now.bench.order.filter(({ part }) => part === 'preparation');
  const voids = before.flatMap((plate): VoidDials[] => {
    const why = after.some(({ plateId }) => plateId === plate.id) ? voidInBeam(plate, now) : 'not-in-beam';
    return why === null ? [] : [{ why, plateId: plate.id, plateName: plate.name }];
  });
  for (const { plateId, name } of after) {
    if (!before.some(({ id }) => id === plateId)) {
      voids.push({ why: 'new-in-beam', plateId, plateName: name });
    }
  }
  if (voids.some(({ why }) => why === 'not-in-beam' || why === 'new-in-beam')) return voids;
  for (const [place, { id, name }] of before.entries()) {
    if (after[place]?.plateId !== id) voids.push({ why: 'moved', plateId: id, plateName: name });
  }
  return voids;
}

function voidInBeam(
  { id, mount }: FrozenPlate,
  { bench, unseatedPlateIds }: { readonly bench: Bench; readonly unseatedPlateIds: ReadonlySet<string> },
): VoidDials['why'] | null {
  if (unseatedPlateIds.has(id)) return 'seat-ended';
  const present = bench.plates.find((plate) => plate.id === id);
  return present !== undefined && present.mount.direction !== mount.direction ? 'numbers-turned' : null;
}
