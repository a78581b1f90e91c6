import { describe, expect, it } from 'vitest';
import { stokesToJones } from '../../../shared/optics/stokes';
import { ellipseOutline } from '../../../src/sphere/ellipse-outline';
import { behindQuarterWave, STATE_ANGLES_DEG } from '../../../src/sign-in-drawing/quarter-arc';
import { wave } from '../../../src/sign-in-drawing/wave';

describe('the states on the sign-in page', () => {
  // By hand from the turn by 90° about (cos2θ, sin2θ, 0): S = (cos²2θ, sin2θ cos2θ, −sin2θ).
  it('are what one quarter-wave plate makes of horizontal light', () => {
    for (const at of STATE_ANGLES_DEG) {
      const [sin, cos] = [Math.sin((at * Math.PI) / 90), Math.cos((at * Math.PI) / 90)];
      const expected = [cos * cos, sin * cos, -sin];
      for (const [k, value] of behindQuarterWave(at).entries())
        expect(value).toBeCloseTo(expected[k] ?? NaN, 12);
    }
  });

  it('are linear at the ends, circular in the middle, clockwise between', () => {
    const senses = STATE_ANGLES_DEG.map((at) => ellipseOutline(behindQuarterWave(at)).sense);
    expect(senses).toEqual([0, ...Array.from({ length: 11 }, () => -1), 0]);
    const circle = ellipseOutline(behindQuarterWave(45));
    expect(circle.major).toBeCloseTo(circle.minor, 12);
  });
});

describe('the wave along the beam', () => {
  it('of horizontal light never leaves the slant on which H is drawn', () => {
    const drawn = wave(stokesToJones([1, 0, 0]), {
      fromX: 0,
      toX: 280,
      beamY: 100,
      periodX: 140,
      amplitude: 30,
      startPhase: 0,
      spokeEvery: 10,
    });
    const spokes = [
      ...`${drawn.frontSpokes}${drawn.backSpokes}`.matchAll(/M([-\d.]+) ([-\d.]+)L([-\d.]+) ([-\d.]+)/g),
    ];
    expect(spokes).toHaveLength(29);
    for (const [, x1, y1, x2, y2] of spokes) {
      const [dx, dy] = [Number(x2) - Number(x1), Number(y2) - Number(y1)];
      expect(Math.abs(dy * 0.33 + dx * 0.26)).toBeLessThan(0.05);
    }
  });
});
