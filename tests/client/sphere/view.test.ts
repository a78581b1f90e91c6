import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { HOME_VIEW, placement, project, RING_REACH, splitAtLimb, viewFrame } from '../../../src/sphere/view';
import { cross, dot, linearPoint, spherePoint } from '../../../src/sphere/vec';
import { anyState, anyView } from './support';

describe('looking at the sphere', () => {
  it('has three right-handed unit vectors from any side, the poles included', () => {
    fc.assert(
      fc.property(anyView, (view) => {
        const { right, up, toViewer } = viewFrame(view);
        const out = cross(right, up);
        for (const k of [0, 1, 2] as const) expect(out[k]).toBeCloseTo(toViewer[k], 12);
        expect(dot(right, right)).toBeCloseTo(1, 12);
        expect(dot(up, up)).toBeCloseTo(1, 12);
      }),
    );
  });

  it('keeps every state inside the limb, and its place on the page and its depth together give its distance', () => {
    fc.assert(
      fc.property(anyView, anyState, (view, state) => {
        const { x, y, depth } = project(state, viewFrame(view));
        expect(x * x + y * y + depth * depth).toBeCloseTo(1, 10);
      }),
    );
  });

  it('puts what it faces in the middle, north up', () => {
    const facingD = viewFrame({ longitudeDeg: 90, latitudeDeg: 0, zoom: 1 });
    const d = project(linearPoint(45), facingD);
    expect([d.x, d.y, d.depth].map((value) => Math.round(value * 1e9) / 1e9 + 0)).toEqual([0, 0, 1]);
    expect(project([0, 0, 1], facingD).y).toBeCloseTo(-1, 12);
    // Looking at D from outside with north up, V lies to the right of H: angles rise to the right.
    expect(project(linearPoint(90), facingD).x).toBeCloseTo(1, 12);
    expect(project(linearPoint(0), facingD).x).toBeCloseTo(-1, 12);
  });

  it('shows H in front and D behind at home', () => {
    const frame = viewFrame(HOME_VIEW);
    expect(project(linearPoint(0), frame).depth).toBeGreaterThan(0.3);
    expect(project(linearPoint(45), frame).depth).toBeLessThan(-0.3);
    expect(project([0, 0, 1], frame).depth).toBeGreaterThan(0.3);
  });
});

describe('cutting a line at the limb', () => {
  it('gives runs of one side each that meet on the limb plane and lose no point', () => {
    fc.assert(
      fc.property(anyView, fc.integer({ min: -80, max: 80 }), (view, latitudeDeg) => {
        const frame = viewFrame(view);
        const line = Array.from({ length: 73 }, (_, k) => spherePoint(k * 5, latitudeDeg));
        const runs = splitAtLimb(line, frame);
        for (const [index, run] of runs.entries()) {
          for (const { depth } of run.points) {
            expect(run.front ? depth : -depth).toBeGreaterThanOrEqual(-1e-12);
          }
          const next = runs[index + 1];
          if (next === undefined) continue;
          expect(next.front).toBe(!run.front);
          expect(next.points[0]).toEqual(run.points.at(-1));
        }
        const drawn = runs.reduce((sum, { points }) => sum + points.length, 0);
        expect(drawn).toBe(line.length + 2 * (runs.length - 1));
      }),
    );
  });

  it('draws half of the equator in front from any side but above a pole', () => {
    const line = Array.from({ length: 361 }, (_, k) => spherePoint(k, 0));
    const runs = splitAtLimb(line, viewFrame({ longitudeDeg: 33.3, latitudeDeg: 12, zoom: 1 }));
    const front = runs.filter((run) => run.front).reduce((sum, { points }) => sum + points.length, 0);
    expect(front).toBeGreaterThan(178);
    expect(front).toBeLessThan(186);
  });
});

describe('the place of the sphere in its box', () => {
  it('keeps the limb ring with its ticks inside', () => {
    fc.assert(
      fc.property(
        fc.integer({ min: 120, max: 1200 }),
        fc.integer({ min: 120, max: 1200 }),
        (width, height) => {
          const { radius, centreX, centreY } = placement(width, height, 1);
          expect(centreX - radius * RING_REACH).toBeGreaterThanOrEqual(0);
          expect(centreY - radius * RING_REACH).toBeGreaterThanOrEqual(0);
        },
      ),
    );
  });
});
