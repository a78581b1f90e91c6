import fc from 'fast-check';
import type { Convention } from '../../../shared/optics/convention';
import type { Stokes } from '../../../shared/optics/stokes';
import type { ReachInput, SphereInput } from '../../../src/sphere';
import { spherePoint } from '../../../src/sphere/vec';
import { HOME_VIEW, type SphereView } from '../../../src/sphere/view';

export const CONVENTION: Convention = { phase: 'kz-wt', handedness: 'receiver', s3Sign: 'L' };

/** A state anywhere on the sphere, evenly by area. */
export const anyState: fc.Arbitrary<Stokes> = fc
  .record({
    s3: fc.double({ min: -1, max: 1, noNaN: true }),
    around: fc.double({ min: 0, max: 6.2831, noNaN: true }),
  })
  .map(({ s3, around }): Stokes => {
    const flat = Math.sqrt(Math.max(0, 1 - s3 * s3));
    return [flat * Math.cos(around), flat * Math.sin(around), s3];
  });

export const anyConvention: fc.Arbitrary<Convention> = fc.record({
  phase: fc.constantFrom('kz-wt' as const, 'wt-kz' as const),
  handedness: fc.constantFrom('receiver' as const, 'source' as const),
  s3Sign: fc.constantFrom('R' as const, 'L' as const),
});

export const anyView: fc.Arbitrary<SphereView> = fc.record({
  longitudeDeg: fc.double({ min: -180, max: 180, noNaN: true }),
  latitudeDeg: fc.double({ min: -90, max: 90, noNaN: true }),
  zoom: fc.constant(1),
});

export const anyInput: fc.Arbitrary<SphereInput> = fc.record({
  start: anyState,
  plates: fc
    .array(
      fc.record({
        fastAxisDeg: fc.double({ min: 0, max: 180, noNaN: true }),
        retardanceDeg: fc.double({ min: 1, max: 350, noNaN: true }),
      }),
      { minLength: 1, maxLength: 4 },
    )
    .map((plates) => plates.map((plate, index) => ({ ...plate, name: `P-${index + 1}` }))),
  target: fc.record({ label: fc.constant('t'), state: anyState }),
  convention: anyConvention,
});

export const HOME = HOME_VIEW;

/** A regular map of the sphere, a cell each `stepDeg` of latitude and longitude. */
export function mapOf(
  stepDeg: number,
  countAt: (latitudeDeg: number, longitudeDeg: number, centre: Stokes) => number,
): ReachInput {
  const rows = Array.from({ length: 180 / stepDeg }, (_, row) => -90 + (row + 0.5) * stepDeg);
  const columns = Array.from({ length: 360 / stepDeg }, (_, column) => (column + 0.5) * stepDeg);
  return {
    stepDeg,
    cells: rows.flatMap((latitudeDeg) =>
      columns.map((longitudeDeg) => {
        const centre = spherePoint(longitudeDeg, latitudeDeg);
        return { centre, latitudeDeg, longitudeDeg, count: countAt(latitudeDeg, longitudeDeg, centre) };
      }),
    ),
  };
}
