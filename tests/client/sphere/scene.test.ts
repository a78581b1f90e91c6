import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { placeLabels } from '../../../src/sphere/labels';
import { basisStates, sphereScene } from '../../../src/sphere/scene';
import { placement, project, viewFrame } from '../../../src/sphere/view';
import { angleBetweenDeg, cross, dot } from '../../../src/sphere/vec';
import { anyInput, anyView, CONVENTION } from './support';

describe('the scene of the sphere', () => {
  it('puts every point of every line on the sphere, and each turn from its state to the next', () => {
    fc.assert(
      fc.property(anyInput, (input) => {
        const scene = sphereScene(input);
        for (const { points } of scene.lines) {
          for (const point of points) expect(dot(point, point)).toBeCloseTo(1, 9);
        }
        const turns = scene.lines.filter(({ role }) => role === 'turn' || role === 'last-turn');
        for (const line of turns) {
          const turn = scene.path.turns[Number(line.id.replace('turn-', ''))];
          expect(line.points[0]).toEqual(turn?.from);
          // The last step is a product of its own: the same state to rounding.
          expect(angleBetweenDeg(line.points.at(-1) ?? [0, 0, 0], turn?.to ?? [0, 0, 0])).toBeLessThan(1e-9);
        }
      }),
    );
  });

  it('points each arrowhead the way that the light is turned: right-handed about the fast axis', () => {
    fc.assert(
      fc.property(anyInput, (input) => {
        const scene = sphereScene(input);
        for (const head of scene.heads) {
          const turn = scene.path.turns[Number(head.id.replace('head-', ''))];
          if (turn === undefined) throw new Error('a head without a turn');
          // At any point p of a right-handed turn about n the light moves along n × p.
          expect(dot(cross(turn.axis, head.at), head.towards) * Math.sign(turn.sweepRad)).toBeGreaterThan(0);
          expect(dot(head.at, head.towards)).toBeCloseTo(0, 9);
        }
      }),
    );
  });

  it('carries a tick for each whole 10° of a turn, foot on the arc', () => {
    const scene = sphereScene({
      start: [1, 0, 0],
      plates: [{ name: 'Q', fastAxisDeg: 20, retardanceDeg: 86.9 }],
      convention: CONVENTION,
    });
    const ticks = scene.ticks.find(({ id }) => id === 'turn-ticks-0');
    expect(ticks?.segments).toHaveLength(8);
    const axis = scene.path.turns[0]?.axis ?? [0, 0, 0];
    const reach = angleBetweenDeg(axis, [1, 0, 0]);
    for (const [foot, tip] of ticks?.segments ?? []) {
      expect(angleBetweenDeg(axis, foot)).toBeCloseTo(reach, 9);
      expect(angleBetweenDeg(axis, tip)).toBeGreaterThan(reach);
    }
  });

  it('engraves the equator in table degrees: 0 at H, 45 at D, 90 at V, −45 at A', () => {
    const scene = sphereScene({ start: [1, 0, 0], plates: [], convention: CONVENTION });
    const at = (text: string) =>
      scene.labels.find((label) => label.role === 'degrees' && label.text === text)?.at[0];
    for (const [text, letter] of [
      ['0°', 'H'],
      ['45°', 'D'],
      ['90°', 'V'],
      ['−45°', 'A'],
    ] as const) {
      const state = basisStates(CONVENTION).find((basis) => basis.letter === letter)?.state;
      const number = at(text);
      if (state === undefined || number === undefined) throw new Error(`no ${text} or ${letter}`);
      expect(angleBetweenDeg(state, number)).toBeLessThan(6);
    }
  });

  it('letters the north pole as the lab names counter-clockwise light, whatever sign it gives to S3', () => {
    for (const s3Sign of ['R', 'L'] as const) {
      const north = (handedness: 'receiver' | 'source') =>
        basisStates({ phase: 'kz-wt', handedness, s3Sign }).find(({ state }) => state[2] === 1)?.letter;
      expect(north('receiver')).toBe('L');
      expect(north('source')).toBe('R');
    }
  });

  it('draws no arc for light along the axis, but still the axis', () => {
    const scene = sphereScene({
      start: [1, 0, 0],
      plates: [{ name: 'H-1', fastAxisDeg: 0, retardanceDeg: 180 }],
      convention: CONVENTION,
    });
    expect(scene.lines.some(({ role }) => role === 'last-turn')).toBe(false);
    expect(scene.heads).toHaveLength(0);
    expect(scene.marks.some(({ kind }) => kind === 'axis')).toBe(true);
  });
});

describe('plates that stand alike', () => {
  it('share one label at their one axis', () => {
    const scene = sphereScene({
      start: [0, 1, 0],
      plates: [
        { name: 'Q-A', fastAxisDeg: 22.5, retardanceDeg: 90 },
        { name: 'H-1', fastAxisDeg: 202.5, retardanceDeg: 180 },
        { name: 'Q-B', fastAxisDeg: 179.99, retardanceDeg: 90 },
        { name: 'Q-C', fastAxisDeg: 0, retardanceDeg: 90 },
      ],
      convention: CONVENTION,
    });
    expect(scene.labels.filter(({ role }) => role === 'axis').map(({ text }) => text)).toEqual([
      'Q-A, H-1 22.5°',
      'Q-B, Q-C 180.0°',
    ]);
  });
});

describe('the labels on the page', () => {
  it('names every basis state, axis and target from any side, at finite places', () => {
    fc.assert(
      fc.property(anyInput, anyView, (input, view) => {
        const scene = sphereScene(input);
        const placed = placeLabels(scene, viewFrame(view), placement(456, 366, 1));
        const wanted = scene.labels.filter(({ role }) => role !== 'degrees').map(({ id }) => id);
        expect(
          placed
            .filter(({ role }) => role !== 'degrees')
            .map(({ id }) => id)
            .sort(),
        ).toEqual(wanted.sort());
        for (const { x, y } of placed) expect(Number.isFinite(x + y)).toBe(true);
      }),
      { numRuns: 40 },
    );
  });

  it('keeps the target’s name, its reticle and every basis letter apart where the target stands on a basis state', () => {
    const onBasis = fc.constantFrom(
      ...basisStates(CONVENTION).map(({ letter, state }) => ({ letter, state })),
    );
    const smallestType = fc.constantFrom(0, 16);
    fc.assert(
      fc.property(onBasis, anyView, smallestType, ({ state }, view, smallestTypePx) => {
        const target = { label: 'out-4', state };
        const scene = sphereScene({ start: [0.6, 0.8, 0], plates: [], target, convention: CONVENTION });
        const frame = viewFrame(view);
        const place = placement(456, 366, 1, smallestTypePx);
        const placed = placeLabels(scene, frame, place);
        const named = placed.filter(({ role }) => role === 'basis' || role === 'target');
        expect(named).toHaveLength(7);
        const at = project(state, frame);
        const reticle = {
          x: place.centreX + at.x * place.radius,
          y: place.centreY + at.y * place.radius,
          halfWidth: 10,
          halfHeight: 10,
        };
        const target1 = named.find(({ role }) => role === 'target');
        if (target1 === undefined) throw new Error('the target has no name');
        for (const letter of named.filter(({ role }) => role === 'basis')) {
          expect(boxesOverlap(letter, target1)).toBe(false);
          expect(boxesOverlap(letter, reticle)).toBe(false);
        }
        expect(boxesOverlap(target1, reticle)).toBe(false);
      }),
      { numRuns: 300 },
    );
  });

  it('says a letter once where the target bears the name of the basis state that it stands on', () => {
    const scene = sphereScene({
      start: [1, 0, 0],
      plates: [],
      target: { label: 'D', state: [0, 1, 0] },
      convention: CONVENTION,
    });
    expect(scene.labels.filter(({ text }) => text === 'D').map(({ role }) => role)).toEqual(['target']);
  });

  it('never prints an engraved number over another label', () => {
    const scene = sphereScene({
      start: [1, 0, 0],
      plates: [
        { name: 'H-3', fastAxisDeg: 71.1, retardanceDeg: 179.2 },
        { name: 'Q-B', fastAxisDeg: 114.73, retardanceDeg: 86.9 },
      ],
      convention: CONVENTION,
    });
    fc.assert(
      fc.property(anyView, (view) => {
        const placed = placeLabels(scene, viewFrame(view), placement(456, 366, 1));
        const numbers = placed.filter(({ role }) => role === 'degrees');
        for (const number of numbers) {
          for (const other of placed.filter((one) => one !== number)) {
            const apart = Math.max(Math.abs(number.x - other.x) - 4, Math.abs(number.y - other.y));
            expect(apart).toBeGreaterThan(5);
          }
        }
      }),
      { numRuns: 40 },
    );
  });
});

interface Box {
  readonly x: number;
  readonly y: number;
  readonly halfWidth: number;
  readonly halfHeight: number;
}

function boxesOverlap(one: Box, other: Box): boolean {
  return (
    Math.abs(one.x - other.x) < one.halfWidth + other.halfWidth &&
    Math.abs(one.y - other.y) < one.halfHeight + other.halfHeight
  );
}
