import fc from 'fast-check';
import { describe, expect, test } from 'vitest';
import { seenMove } from '../../../src/components/dial-words';
import { alreadyReads, settingSteps, type StepMount } from '../../../src/features/runs/bench-steps';
import { announcement, dialText, moveWords } from '../../../src/features/runs/move-words';

const resolutions = [0.01, 0.05, 0.1, 0.25, 0.5, 1, 2] as const;
const mount: fc.Arbitrary<StepMount> = fc.record({
  direction: fc.constantFrom(1 as const, -1 as const),
  resolutionDeg: fc.constantFrom(...resolutions),
});
const mark = (resolutionDeg: number) =>
  fc
    .integer({ min: 0, max: Math.round(360 / resolutionDeg) - 1 })
    .map((step) => Number((step * resolutionDeg).toFixed(3)));
const plate = mount.chain((made) =>
  fc.record({
    mount: fc.constant(made),
    wanted: mark(made.resolutionDeg),
    stands: fc.option(mark(made.resolutionDeg)),
  }),
);
const side = fc.constantFrom('receiver' as const, 'source' as const);

/** What the hand does with the words, and nothing else: which reading is under the index afterwards. */
function follow(
  from: number,
  sense: string,
  amount: number,
  made: StepMount,
  seenFrom: 'receiver' | 'source',
): number {
  const seenCounterClockwise = sense === 'counter-clockwise' ? 1 : -1;
  const forReceiver = seenFrom === 'receiver' ? seenCounterClockwise : -seenCounterClockwise;
  return from + forReceiver * made.direction * amount;
}

function apart(a: number, b: number): number {
  const difference = (((a - b) % 360) + 360) % 360;
  return Math.min(difference, 360 - difference);
}

describe('the steps of one setting', () => {
  test('following the words from where the dials stand ends at every wanted reading, from either side', () => {
    fc.assert(
      fc.property(fc.array(plate, { minLength: 1, maxLength: 6 }), side, (plates, seenFrom) => {
        const mounts = plates.map((item) => item.mount);
        const wantedDeg = plates.map((item) => item.wanted);
        const standingDeg = plates.map((item) => item.stands);
        const confirmedDeg: (number | null)[] = plates.map(() => null);
        let last = -1;
        for (let turn = 0; turn <= plates.length; turn += 1) {
          const { now, dialledDeg } = settingSteps({
            mounts,
            wantedDeg,
            standingDeg,
            confirmedDeg,
            side: seenFrom,
          });
          if (now === null) {
            expect(dialledDeg).not.toBeNull();
            dialledDeg?.forEach((dial, index) => {
              expect(apart(dial, wantedDeg[index] ?? NaN)).toBeLessThan(1e-9);
            });
            return;
          }
          expect(dialledDeg).toBeNull();
          expect(now.plateIndex).toBeGreaterThan(last);
          last = now.plateIndex;
          const made = mounts[now.plateIndex];
          if (made === undefined) throw new Error('a step names a plate that is not there');
          const words = moveWords(now, made);
          if (now.standsDeg === null) {
            expect(words).toBeNull();
          } else if (words !== null) {
            const reached = follow(now.standsDeg, words.sense, Number(words.amount), made, seenFrom);
            expect(apart(reached, now.wantedDeg)).toBeLessThan(1e-9);
          }
          confirmedDeg[now.plateIndex] = now.wantedDeg;
        }
        throw new Error('the steps of a setting did not come to an end');
      }),
      { numRuns: 2000 },
    );
  });

  test('the numbers rise or fall as the words say, whichever side one stands on', () => {
    fc.assert(
      fc.property(plate, side, ({ mount: made, wanted, stands }, seenFrom) => {
        fc.pre(stands !== null && stands !== wanted);
        const move = seenMove(stands, wanted, made.direction, seenFrom);
        const reached = stands + (move.numbers === 'rise' ? 1 : -1) * move.amountDeg;
        expect(apart(reached, wanted)).toBeLessThan(1e-9);
        expect(move.amountDeg).toBeLessThanOrEqual(180);
      }),
    );
  });

  test('from the source side each turn is the mirror of what the receiver sees', () => {
    fc.assert(
      fc.property(plate, ({ mount: made, wanted, stands }) => {
        fc.pre(stands !== null && apart(stands, wanted) > 1e-6 && apart(stands, wanted) < 180 - 1e-6);
        const seen = seenMove(stands, wanted, made.direction, 'receiver');
        const mirrored = seenMove(stands, wanted, made.direction, 'source');
        expect(new Set([seen.sense, mirrored.sense])).toEqual(new Set(['clockwise', 'counter-clockwise']));
        expect(mirrored.turnDeg + seen.turnDeg).toBe(0);
        expect(mirrored.numbers).toBe(seen.numbers);
      }),
    );
  });

  const two: StepMount[] = [
    { direction: 1, resolutionDeg: 0.1 },
    { direction: -1, resolutionDeg: 0.1 },
  ];

  test('a plate whose dial already reads the wanted number stays, and is recorded as it reads', () => {
    const { plates, now, dialledDeg } = settingSteps({
      mounts: two,
      wantedDeg: [83.5, 187],
      standingDeg: [83.48, 187],
      confirmedDeg: [null, null],
      side: 'receiver',
    });
    expect(plates.map(({ state }) => state)).toEqual(['stays', 'stays']);
    expect(now).toBeNull();
    expect(dialledDeg).toEqual([83.48, 187]);
  });

  test('a dial that was kept one step off is turned at the next setting that wants it right', () => {
    const { now } = settingSteps({
      mounts: two,
      wantedDeg: [83.5, 187],
      standingDeg: [83.4, 187],
      confirmedDeg: [null, null],
      side: 'receiver',
    });
    expect(now?.plateIndex).toBe(0);
    expect(now?.move?.amountDeg).toBeCloseTo(0.1, 9);
  });

  test('359.9 and 0.0 are one step apart, not a whole turn', () => {
    expect(alreadyReads(359.98, 0, 0.1)).toBe(true);
    expect(seenMove(359.9, 0, 1).amountDeg).toBeCloseTo(0.1, 9);
  });

  test('a screen reader hears plate, way, distance and number', () => {
    const { now } = settingSteps({
      mounts: two,
      wantedDeg: [83.5, 187],
      standingDeg: [83.5, 156.7],
      confirmedDeg: [null, null],
      side: 'receiver',
    });
    if (now === null || two[1] === undefined) throw new Error('the second plate has to turn');
    // Numbers of this mount fall counter-clockwise, so that a rise of 30.3 is a clockwise turn.
    expect(announcement('Q-B', now, two[1], 'receiver')).toBe('Q-B, turn clockwise by 30.3° to 187.0');
  });

  test('where nobody has said how a dial stands, only its number is asked for', () => {
    const { now } = settingSteps({
      mounts: two,
      wantedDeg: [83.5, 187],
      standingDeg: [null, null],
      confirmedDeg: [null, null],
      side: 'receiver',
    });
    if (now === null || two[0] === undefined) throw new Error('the first plate has to turn');
    expect(moveWords(now, two[0])).toBeNull();
    expect(announcement('H-3', now, two[0], 'receiver')).toBe('H-3, set to 83.5');
  });

  test('a dial read finer than its resolution keeps its digits', () => {
    expect(dialText(83.47, 0.1)).toBe('83.47');
    expect(dialText(83, 0.1)).toBe('83.0');
  });
});
