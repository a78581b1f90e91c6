import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { degrees, fastAxisFromDial } from '../../shared/optics';
import { type MountMotion, mountMove, readingsFor } from '../../shared/optics/sequence';
import { mountMotion, ring, travelByHand } from './sequence-problems';

describe('a move of one mount', () => {
  it('takes the shorter way round a ring and the only way on a stage', () => {
    expect(mountMove(ring, 350, 10)).toMatchObject({ travelDeg: 20, numbers: 'rise', viaDeg: null });
    const stage: MountMotion = { ...ring, rangeDeg: [0, 360] };
    expect(mountMove(stage, 350, 10)).toMatchObject({ travelDeg: 340, numbers: 'fall' });
  });

  it('goes past the reading by the play and comes back when it would end in the wrong sense', () => {
    const played: MountMotion = { ...ring, backlashDeg: 2, approach: 'rising' };
    expect(mountMove(played, 10, 30)).toMatchObject({ travelDeg: 20, viaDeg: null, numbers: 'rise' });
    expect(mountMove(played, 30, 10)).toMatchObject({ travelDeg: 24, viaDeg: 8, numbers: 'fall' });
    expect(mountMove(played, 30, 1)).toMatchObject({ viaDeg: 359 });
    expect(mountMove(played, 30, 30)).toMatchObject({ travelDeg: 0, viaDeg: null, numbers: 'stay' });
  });

  it('goes the long way round a ring when the play makes that the shorter one', () => {
    const played: MountMotion = { ...ring, backlashDeg: 3, approach: 'rising' };
    expect(mountMove(played, 181, 0)).toMatchObject({ travelDeg: 179, numbers: 'rise' });
    expect(mountMove(played, 179, 0)).toMatchObject({ travelDeg: 181, numbers: 'rise' });
    expect(mountMove(played, 176, 0)).toMatchObject({ travelDeg: 182, numbers: 'fall', viaDeg: 357 });
  });

  it('agrees with the rule written a second time', () => {
    fc.assert(
      fc.property(
        mountMotion,
        fc.integer({ min: 0, max: 3599 }),
        fc.integer({ min: 0, max: 3599 }),
        (mount, a, b) => {
          expect(mountMove(mount, a / 10, b / 10).travelDeg).toBeCloseTo(
            travelByHand(mount, a / 10, b / 10),
            9,
          );
        },
      ),
      { seed: 4 },
    );
  });
});

describe('the readings of a plate', () => {
  it('all put the fast axis where it was asked for, to the dial’s step', () => {
    fc.assert(
      fc.property(mountMotion, fc.double({ min: -360, max: 360, noNaN: true }), (mount, fastAxisDeg) => {
        for (const reading of readingsFor(mount, fastAxisDeg)) {
          const off = fastAxisFromDial(degrees(reading), mount) - fastAxisDeg;
          const apart = Math.abs(off - 180 * Math.round(off / 180));
          expect(apart).toBeLessThanOrEqual(mount.resolutionDeg / 2 + 1e-9);
        }
      }),
      { seed: 5 },
    );
  });

  it('are two on a ring, and as many on a stage as its range and its play leave', () => {
    expect(readingsFor({ ...ring, offsetDeg: 83.54 }, 10)).toEqual([93.5, 273.5]);
    expect(readingsFor({ ...ring, rangeDeg: [-200, 200] }, 10)).toEqual([-170, 10, 190]);
    expect(readingsFor({ ...ring, rangeDeg: [0, 360], backlashDeg: 2, approach: 'rising' }, 1)).toEqual([
      181,
    ]);
    expect(readingsFor({ ...ring, rangeDeg: [0, 100] }, 150)).toEqual([]);
  });
});
