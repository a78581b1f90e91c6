import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { reachRows, shareWhere } from '../../../src/sphere/reach-grid';
import { reachInWords } from '../../../src/sphere/reach-words';
import { sphereScene } from '../../../src/sphere/scene';
import { angleBetweenDeg, dot, spherePoint, type Vec3 } from '../../../src/sphere/vec';
import { CONVENTION, mapOf } from './support';

const north: Vec3 = [0, 0, 1];
const polarDeg = (point: Vec3) =>
  Math.min(angleBetweenDeg(point, north), 180 - angleBetweenDeg(point, north));

/** Nothing within `outDeg` of either pole, two ways within `twoDeg`, four elsewhere. */
const caps = (stepDeg: number, outDeg: number, twoDeg: number) =>
  mapOf(stepDeg, (latitudeDeg) =>
    90 - Math.abs(latitudeDeg) < outDeg ? 0 : 90 - Math.abs(latitudeDeg) < twoDeg ? 2 : 4,
  );

const ticksOf = (reach: ReturnType<typeof mapOf>) =>
  new Map(
    sphereScene({ start: [1, 0, 0], plates: [], reach, convention: CONVENTION }).ticks.map(
      ({ id, segments }) => [id, segments.flat()],
    ),
  );

describe('what a pair of plates reaches, on the sphere', () => {
  it('is hatched inside its edge, edged on the border of its cells, and dotted where there are two ways', () => {
    const ticks = ticksOf(caps(2, 20, 40));
    const [hatch, edge, dots] = ['reach-hatch', 'reach-edge', 'reach-dots'].map((id) => ticks.get(id) ?? []);
    expect(hatch?.length).toBeGreaterThan(40);
    for (const point of hatch ?? []) {
      expect(dot(point, point)).toBeCloseTo(1, 9);
      expect(polarDeg(point)).toBeLessThan(20.3);
    }
    expect(edge?.length).toBeGreaterThan(600);
    for (const point of edge ?? []) expect(Math.abs(polarDeg(point) - 20)).toBeLessThan(1);
    expect(dots?.length).toBeGreaterThan(100);
    for (const point of dots ?? []) {
      expect(polarDeg(point)).toBeGreaterThan(19);
      expect(polarDeg(point)).toBeLessThan(42);
    }
  });

  it('never draws the edge beyond the centre of a cell, wherever the region lies and whatever the step', () => {
    fc.assert(
      fc.property(
        fc.integer({ min: 0, max: 359 }),
        fc.integer({ min: -80, max: 80 }),
        fc.integer({ min: 12, max: 60 }),
        fc.constantFrom(3, 5, 6),
        (longitudeDeg, latitudeDeg, radiusDeg, stepDeg) => {
          const middle = spherePoint(longitudeDeg, latitudeDeg);
          const map = mapOf(stepDeg, (_lat, _lon, centre) =>
            angleBetweenDeg(centre, middle) < radiusDeg ? 0 : 4,
          );
          const edge = ticksOf(map).get('reach-edge') ?? [];
          expect(edge.length).toBeGreaterThan(8);
          for (const point of edge) {
            expect(Math.abs(angleBetweenDeg(point, middle) - radiusDeg)).toBeLessThan(1.5 * stepDeg);
          }
        },
      ),
      { numRuns: 25 },
    );
  });

  it('hatches nothing where all is reached, and marks the light that the map is for', () => {
    const reach = mapOf(6, () => 4);
    const scene = sphereScene({ start: [0.6, 0.8, 0], plates: [], reach, convention: CONVENTION });
    expect(scene.ticks.map(({ id }) => id)).toEqual(['equator-ticks']);
    expect(scene.marks.filter(({ kind }) => kind === 'between').map(({ at }) => at)).toEqual([[0.6, 0.8, 0]]);
  });

  it('stays within what can be drawn at once on the whole sphere', () => {
    const strokes = [...ticksOf(mapOf(1, () => 0)).values()].reduce(
      (sum, points) => sum + points.length / 2,
      0,
    );
    expect(strokes).toBeLessThan(5000);
  });
});

describe('the reach in words', () => {
  it('gives the share of two polar caps by area', () => {
    // Archimedes: two caps of half-angle a are 1 − cos a of the sphere.
    const share = shareWhere(reachRows(caps(2, 20, 40)), (count) => count === 0);
    expect(share).toBeCloseTo(1 - Math.cos(Math.PI / 9), 9);
  });

  it('says where it lies and how far it goes', () => {
    expect(reachInWords(caps(2, 20, 40), CONVENTION).text).toBe(
      '6.0\u202F% of the sphere is out of reach: around both poles to 20°. 17\u202F% is reached in two ways. ' +
        'Read off a map with a cell each 2° of the sphere; a gap smaller than that can be missed.',
    );
    // Cells of 0.5° whose centres lie within 2.3° of a pole end at 2.5°.
    expect(reachInWords(caps(0.5, 2.3, 0), CONVENTION).text).toContain(
      'Less than 0.1\u202F% of the sphere is out of reach: around both poles to 2.5°.',
    );
    const aroundD = mapOf(2, (_lat, _lon, centre) => (angleBetweenDeg(centre, [0, 1, 0]) < 15 ? 0 : 4));
    expect(reachInWords(aroundD, CONVENTION).text).toMatch(
      /out of reach: around D to between 1[45]° and 1[56]°\./,
    );
    const oneCap = mapOf(2, (latitudeDeg) => (latitudeDeg > 80 ? 0 : 4));
    expect(reachInWords(oneCap, CONVENTION).text).toContain('around L to 10°');
    expect(
      reachInWords(
        mapOf(6, () => 4),
        CONVENTION,
      ).text,
    ).toMatch(/^Every cell of the map is within reach\./);
    expect(reachInWords({ stepDeg: 2, cells: [] }, CONVENTION).text).toContain('no cells');
  });
});
