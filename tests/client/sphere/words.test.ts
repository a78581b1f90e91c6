import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { showStokes } from '../../../shared/optics/convention';
import { fieldInWords, fieldParts } from '../../../src/sphere/field-words';
import { ellipseOutline } from '../../../src/sphere/ellipse-outline';
import { missInWords, pathInWords, stateInWords } from '../../../src/sphere/path-words';
import { sphereScene } from '../../../src/sphere/scene';
import { project, viewFrame } from '../../../src/sphere/view';
import { angleBetweenDeg } from '../../../src/sphere/vec';
import { anyInput, anyState, CONVENTION } from './support';

describe('the path in words', () => {
  it('tells the states and turns of the scene that is drawn, in 1 000 random paths', () => {
    fc.assert(
      fc.property(anyInput, (input) => {
        const words = pathInWords(input);
        const { path } = sphereScene(input);
        expect(words.turns).toHaveLength(path.turns.length);
        for (const [index, turn] of path.turns.entries()) {
          const told = words.turns[index];
          const { s1, s2, s3 } = showStokes(turn.to, input.convention);
          expect(told?.after.shown).toEqual([s1, s2, s3]);
          expect(told?.after.text).toBe(stateInWords(turn.to, input.convention));
          expect(told?.amountDeg).toBeCloseTo((Math.abs(turn.sweepRad) * 180) / Math.PI, 9);
        }
        const end = path.statesAfter.at(-1) ?? input.start;
        expect(words.target?.missDeg).toBeCloseTo(angleBetweenDeg(end, input.target?.state ?? end), 9);
      }),
      { numRuns: 1000 },
    );
  });

  it('says the sense that the arrow shows, seen from outside above the fast axis', () => {
    fc.assert(
      fc.property(anyInput, (input) => {
        const words = pathInWords(input);
        const scene = sphereScene(input);
        for (const head of scene.heads) {
          const index = Number(head.id.replace('head-', ''));
          const axis = scene.path.turns[index]?.axis;
          if (axis === undefined) throw new Error('a head without a turn');
          // Looked at from above the axis, on the page: the way from the middle to the head, and the head's own way.
          const longitudeDeg = (Math.atan2(axis[1], axis[0]) * 180) / Math.PI;
          const above = viewFrame({ longitudeDeg, latitudeDeg: 0, zoom: 1 });
          const at = project(head.at, above);
          const towards = project(head.towards, above);
          // y runs down the page, so a counter-clockwise turn has a negative cross product.
          const seen = at.x * towards.y - at.y * towards.x < 0 ? 'counter-clockwise' : 'clockwise';
          expect(words.turns[index]?.sense).toBe(seen);
        }
      }),
    );
  });

  it('names basis states by the lab’s letters', () => {
    expect(stateInWords([1, 0, 0], CONVENTION)).toBe('H');
    expect(stateInWords([0, 0, 1], CONVENTION)).toBe('L');
    expect(stateInWords([0, 0, 1], { ...CONVENTION, handedness: 'source' })).toBe('R');
    expect(stateInWords([Math.cos(1), Math.sin(1), 0], CONVENTION)).toBe('linear at 28.6°');
    const lower = stateInWords([0.6, 0, -0.8], CONVENTION);
    expect(lower).toBe('ellipse at 0.0°, ellipticity 26.6°, clockwise to the receiver (R)');
  });

  it('says how far the end is from the target', () => {
    expect(missInWords('t2', 0.001)).toBe('on t2 within 0.01°');
    expect(missInWords('c+', 2.3)).toBe('2.30° from c+ on the sphere');
  });
});

describe('the field in words', () => {
  it('gives the hand that the ellipse’s arrow shows', () => {
    fc.assert(
      fc.property(anyState, (state) => {
        const { sense } = ellipseOutline(state);
        if (sense === 0) return;
        const text = fieldInWords(state);
        expect(text).toContain(sense > 0 ? '; counter-clockwise' : '; clockwise');
      }),
    );
  });

  it('draws traces whose tip runs the way the ellipse’s arrows point', () => {
    fc.assert(
      fc.property(anyState, (state) => {
        const { h, v, lagDeg } = fieldParts(state);
        const { sense } = ellipseOutline(state);
        if (sense === 0 || lagDeg === undefined) return;
        const lag = (lagDeg * Math.PI) / 180;
        const at = (phase: number) => [h * Math.cos(phase), v * Math.cos(phase - lag)] as const;
        const [one, next] = [at(0.3), at(0.3 + 1e-3)];
        expect(Math.sign(one[0] * next[1] - one[1] * next[0])).toBe(sense);
      }),
    );
  });

  it('says by how much E_V follows E_H: bloch(109.47°, 120°) by 120°', () => {
    const [theta, phi] = [Math.acos(-1 / 3), (2 * Math.PI) / 3];
    // Bloch (x, y, z) = (S2, S3, S1), optics frame.
    const state = [
      Math.cos(theta),
      Math.sin(theta) * Math.cos(phi),
      Math.sin(theta) * Math.sin(phi),
    ] as const;
    expect(fieldInWords(state)).toBe('E_V follows E_H by 120.0°; counter-clockwise to the receiver');
    expect(fieldInWords([1, 0, 0])).toBe('E_V is nothing: the field stays along H');
    expect(fieldInWords([-1, 0, 0])).toBe('E_H is nothing: the field stays along V');
    expect(fieldInWords([0, 0, -1])).toBe('E_V leads E_H by 90.0°; clockwise to the receiver');
    expect(fieldInWords([0, 1, 0])).toContain('rise and fall together');
    expect(fieldInWords([0, -1, 0])).toContain('falls as E_H rises');
  });
});
