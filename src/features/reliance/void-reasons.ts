import type { VoidDials } from '../../../shared/schemas/reliance';
import { listed } from '../../../shared/words';

/** Why dials are void, the plates of one reason together: "H-3 left the seat that they were solved for". */
export function voidReasons(voids: readonly VoidDials[]): readonly string[] {
  const reason = (
    why: VoidDials['why'],
    words: (names: string, isOrAre: 'is' | 'are') => string,
  ): string[] => {
    const names = voids.filter((each) => each.why === why).map(({ plateName }) => plateName);
    return names.length === 0 ? [] : [words(listed(names), names.length === 1 ? 'is' : 'are')];
  };
  return [
    ...reason('seat-ended', (names) => `${names} left the seat that they were solved for`),
    ...reason('not-in-beam', (names, isOrAre) => `${names} ${isOrAre} not in the beam any more`),
    ...reason('new-in-beam', (names, isOrAre) => `${names} ${isOrAre} new in the beam`),
    ...reason('moved', (names) => `${names} changed places`),
    ...reason('numbers-turned', (names) => `the numbers around ${names} rise the other way now`),
  ];
}
