import { expect, test } from 'vitest';
import { radians } from '../../shared/optics';
import { apply } from '../../shared/optics/solver/apply';
import { product, randomStream, stack } from './independent';
import { isAmong, searchedZeros, unitaryMiss } from './unitary-search';

const DEGREE = Math.PI / 180;

/*
 * Round retardances and gates of round plates are where families, grazing roots and vanishing numbers are. A random search
 * can't list a family, but whatever it lands on must be among the members at those free angles.
 */
test('round retardances and round gates, 1 to 3 plates: whatever a search lands on is a setting or a member that was found', () => {
  const random = randomStream(81);
  const pick = (list: readonly number[]): number => list[Math.floor(list.length * random())] ?? 90;
  const counts = new Map<string, number>();
  for (let k = 0; k < 250; k += 1) {
    const plates = 1 + Math.floor(2.999 * random() ** 0.5);
    const retardancesRad = Array.from(
      { length: plates },
      () => pick([90, 90, 180, 180, 45, 60, 120, 135, 270]) * DEGREE,
    );
    // One, two or three plates of round retardance at round angles, not always those of the stack.
    const gate = Array.from({ length: 1 + Math.floor(3 * random()) }, (_, plate) => ({
      retardanceRad: random() < 0.7 ? (retardancesRad[plate] ?? Math.PI) : pick([45, 90, 180, 360]) * DEGREE,
      angle: pick([0, 15, 22.5, 30, 45, 60, 67.5, 90, 112.5, 135, 150]) * DEGREE,
    }));
    const target = product(
      stack(
        gate.map(({ retardanceRad }) => retardanceRad),
        gate.map(({ angle }) => angle),
      ),
      stack([0], [0]),
    );
    const [[a], [c]] = target;
    const answer = apply({
      target: { w: a.re, x: -c.im, y: c.re, z: -a.im },
      retardancesRad: retardancesRad.map(radians),
    });
    counts.set(answer.kind, (counts.get(answer.kind) ?? 0) + 1);
    const problem = { target, retardancesRad };
    const searched = searchedZeros(problem, plates === 3 ? 4 : 6);
    const label = JSON.stringify({ retardances: retardancesRad.map((rad) => rad / DEGREE), gate });
    expect(answer.solutions.length, label).toBeGreaterThan(0);
    if (searched.length > 0) expect(answer.shortfallRad, label).toBe(0);
    for (const { fastAxesRad, infidelity } of answer.solutions)
      expect((2 / 3) * unitaryMiss(problem, fastAxesRad), label).toBeCloseTo(infidelity, 13);
    for (const { fastAxesRad } of searched) {
      const members =
        answer.family?.membersAt(
          answer.family.freePlates.map((plate) => radians(fastAxesRad[plate] ?? NaN)),
        ) ?? answer.solutions;
      expect(isAmong([...members, ...answer.solutions], fastAxesRad, 1e-4), label).toBe(true);
    }
  }
  // Each kind has been met.
  for (const kind of ['exact', 'nearest', 'family']) expect(counts.get(kind) ?? 0).toBeGreaterThan(20);
}, 60_000);
