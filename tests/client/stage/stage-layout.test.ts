import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { arrangeStage, fittingStage, RING_RADIUS } from '../../../src/stage/stage-layout';

describe('the size of the stage', () => {
  it('gives two plates the full rings on a 1440 px page', () => {
    expect(fittingStage(1140, 2).ringRadius).toBe(80);
  });

  it('shrinks the rings before it scrolls, never below 60 and never above 80', () => {
    fc.assert(
      fc.property(fc.integer({ min: 200, max: 2400 }), fc.integer({ min: 0, max: 6 }), (width, plates) => {
        const { ringRadius, leastWidth } = fittingStage(width, plates);
        expect(ringRadius).toBeGreaterThanOrEqual(RING_RADIUS.least);
        expect(ringRadius).toBeLessThanOrEqual(RING_RADIUS.most);
        if (leastWidth > width) expect(ringRadius).toBe(RING_RADIUS.least);
      }),
    );
  });

  it('puts the readout under the beam line before it lets that scroll', () => {
    expect(arrangeStage(1360, 2, true)).toMatchObject({ readoutBeside: true, scrolls: false });
    expect(arrangeStage(1100, 3, true)).toMatchObject({ readoutBeside: false, scrolls: false });
    expect(arrangeStage(350, 2, true)).toMatchObject({ readoutBeside: false, scrolls: true });
    fc.assert(
      fc.property(fc.integer({ min: 200, max: 2400 }), fc.integer({ min: 1, max: 6 }), (width, plates) => {
        const { readoutBeside, scrolls } = arrangeStage(width, plates, true);
        expect(readoutBeside && scrolls).toBe(false);
      }),
    );
  });
});
