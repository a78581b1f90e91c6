import fc from 'fast-check';
import { complex, type Complex, cos, multiply, pi, sin } from 'mathjs';
import { expect, test } from 'vitest';
import { DEFAULT_CONVENTION } from '../../shared/optics/convention';
import { freeze } from '../../shared/protocol/freeze';
import { reliance, relianceSteps } from '../../shared/protocol/reliance';
import type { Bench, Plate, VersionContent } from '../../shared/schemas';
import { bench as anyBench, draft, idsFrom, plate as anyPlate, target } from '../support/plates';

const id = idsFrom('00000000');
const half = { retardanceDeg: 180, offsetDeg: 10 };
const quarter = { retardanceDeg: 90, offsetDeg: 301.7 };

const plateOf = (number: number, name: string, calibration: Partial<Plate['calibration']>) =>
  anyPlate({
    id: id(number),
    name,
    mount: { resolutionDeg: 0.001 },
    calibration: { id: id(number + 100), ...calibration },
  });

const H3 = plateOf(20, 'H-3', half);
const QB = plateOf(21, 'Q-B', quarter);

function benchOf(plates: readonly Plate[], change: Partial<Bench> = {}): Bench {
  const order = plates.map(({ id: plateId, name }) => ({ plateId, name, part: 'preparation' as const }));
  return anyBench({ id: id(3), plates: [...plates], order, ...change });
}

function versionOf(bench: Bench, expressions: readonly string[], toleranceInfidelity = 1e-3): VersionContent {
  const frozen = freeze({
    lab: { id: id(1), name: 'A lab', convention: DEFAULT_CONVENTION },
    protocolId: id(2),
    draft: draft({
      benchId: id(3),
      toleranceInfidelity,
      targets: expressions.map((expression, index) =>
        target({ id: id(10 + index), label: `t${index + 1}`, expression }),
      ),
    }),
    bench,
    number: 1,
    parentHash: null,
    message: 'First.',
    savedAt: new Date('2026-06-16T10:42:07Z'),
    savedBy: { id: id(4), name: 'Someone' },
  });
  if (!frozen.ok) throw new Error(frozen.faults.map(({ message }) => message).join(' '));
  return frozen.content;
}

/** The plate measured again in its seat. */
const again = (plate: Plate, change: Partial<Plate['calibration']>): Plate => ({
  ...plate,
  calibration: { ...plate.calibration, id: id(300), ...change },
});

const now = (bench: Bench, unseated: readonly string[] = []) => ({
  bench,
  convention: DEFAULT_CONVENTION,
  unseatedPlateIds: new Set(unseated),
});

/** Angles that a state or a mount may well be off by, and not so small that rounding is all there is. */
const shiftDeg = fc.double({ min: 0.01, max: 40, noNaN: true });
const expression = fc
  .tuple(fc.double({ min: 0, max: 180, noNaN: true }), fc.double({ min: 0, max: 360, noNaN: true }))
  .map(([polar, azimuth]) => `bloch(${polar.toFixed(3)}deg, ${azimuth.toFixed(3)}deg)`);

test('a half-wave plate whose zero moved by a turns linear light by 2a, 4a on the sphere: 1 − F is sin²(2a)', () => {
  fc.assert(
    fc.property(shiftDeg, fc.double({ min: 0, max: 89, noNaN: true }), (a, axis) => {
      const content = versionOf(benchOf([H3]), [`linear(${axis.toFixed(3)}deg)`]);
      const moved = again(H3, { offsetDeg: half.offsetDeg + a });
      const report = reliance(content, now(benchOf([moved])));
      // The dial itself is rounded to 0.001°, which its own infidelity bounds.
      const expected = sin((2 * a * pi) / 180) ** 2;
      expect(report.targets[0]?.oldDials).toBeCloseTo(expected, 4);
      expect(report.plates[0]).toMatchObject({ change: 'recalibrated' });
      expect(report.plates[0]?.zeroShiftDeg).toBeCloseTo(a, 9);
      expect(report.targets[0]?.resolved).toBeLessThan(1e-8);
    }),
    { numRuns: 60 },
  );
});

/** |⟨a|M|in⟩|² by complex matrices of mathjs: nothing of ours is in it. Retarder: R(θ) diag(e^{-iδ/2}, e^{iδ/2}) R(−θ). */
function jonesRetarder(retardanceDeg: number, fastAxisDeg: number): Complex[][] {
  const theta = (fastAxisDeg * pi) / 180;
  const half = (retardanceDeg * pi) / 360;
  const [c, s] = [cos(theta), sin(theta)];
  const fast = complex(cos(half), -sin(half));
  const slow = complex(cos(half), sin(half));
  const sum = (x: number, y: number) => complex(fast.re * x + slow.re * y, fast.im * x + slow.im * y);
  const across = complex((fast.re - slow.re) * c * s, (fast.im - slow.im) * c * s);
  return [
    [sum(c * c, s * s), across],
    [across, sum(s * s, c * c)],
  ];
}

test('what two plates make at old dials with new zeros and retardances agrees with Jones matrices multiplied by mathjs', () => {
  const linear = fc.double({ min: 0, max: 179, noNaN: true });
  fc.assert(
    fc.property(
      linear,
      shiftDeg,
      shiftDeg,
      fc.double({ min: -5, max: 5, noNaN: true }),
      (axis, a, b, more) => {
        const content = versionOf(benchOf([H3, QB]), [`linear(${axis.toFixed(3)}deg)`]);
        const plates = [
          again(H3, { offsetDeg: half.offsetDeg + a, retardanceDeg: 180 + more }),
          again(QB, { offsetDeg: quarter.offsetDeg - b, retardanceDeg: 90 - more }),
        ] as const;
        const { targets } = reliance(content, now(benchOf(plates)));
        const dials = content.targets[0]?.solutions[content.targets[0].chosenSolution]?.dialsDeg ?? [];
        const [first, second] = plates.map(({ calibration }, k) =>
          jonesRetarder(calibration.retardanceDeg, (dials[k] ?? 0) - calibration.offsetDeg),
        );
        const out = multiply(multiply(second ?? [], first ?? []), [complex(1, 0), complex(0, 0)]);
        const wanted = (Number(axis.toFixed(3)) * pi) / 180;
        const [x, y] = out.map((entry) => complex(entry));
        const [c, s] = [cos(wanted), sin(wanted)];
        const re = c * (x?.re ?? 0) + s * (y?.re ?? 0);
        const im = c * (x?.im ?? 0) + s * (y?.im ?? 0);
        expect(targets[0]?.oldDials).toBeCloseTo(1 - re * re - im * im, 12);
      },
    ),
    { numRuns: 60 },
  );
});

test('nothing changed: the old dials make to the last bit what was frozen, and nothing is stale', () => {
  fc.assert(
    fc.property(fc.array(expression, { minLength: 1, maxLength: 3 }), (expressions) => {
      const bench = benchOf([H3, QB]);
      const content = versionOf(bench, expressions);
      const report = reliance(content, now(bench));
      expect(report.stale).toBe(false);
      expect(report.voids).toEqual([]);
      for (const { frozen, oldDials, resolved } of report.targets) {
        expect([oldDials, resolved]).toEqual([frozen, frozen]);
      }
    }),
    { numRuns: 25 },
  );
});

test('a zero that moved by whole half turns changes nothing of the light, and is a new calibration all the same', () => {
  const content = versionOf(benchOf([H3, QB]), ['D', 'R']);
  const report = reliance(content, now(benchOf([again(H3, { offsetDeg: half.offsetDeg + 180 }), QB])));
  for (const { frozen, oldDials } of report.targets) expect(oldDials).toBeCloseTo(frozen, 12);
  expect(report.plates[0]).toMatchObject({ change: 'recalibrated', zeroShiftDeg: 0 });
  expect(report.stale).toBe(true);
});

test('targets are within or out by the tolerance of the version, and the worst is the largest of all', () => {
  fc.assert(
    fc.property(
      fc.array(expression, { minLength: 1, maxLength: 4 }),
      shiftDeg,
      fc.double({ min: 1e-6, max: 0.3, noNaN: true }),
      (expressions, a, tolerance) => {
        const content = versionOf(benchOf([H3, QB]), expressions, tolerance);
        const report = reliance(content, now(benchOf([again(H3, { offsetDeg: half.offsetDeg + a }), QB])));
        for (const key of ['frozen', 'oldDials', 'resolved'] as const) {
          const tally = report[key];
          const values = report.targets.map((each) => each[key] ?? NaN);
          const worst = Math.max(...values);
          expect(tally?.out).toBe(values.filter((value) => value > tolerance).length);
          expect((tally?.within ?? 0) + (tally?.out ?? 0)).toBe(values.length);
          expect(tally?.worst).toEqual({
            row: values.indexOf(worst) + 1,
            label: `t${values.indexOf(worst) + 1}`,
            infidelity: worst,
          });
        }
      },
    ),
    { numRuns: 25 },
  );
});

test('a plate that left its seat takes its zero along: what the old dials make cannot be told, a re-solve can', () => {
  const content = versionOf(benchOf([H3, QB]), ['D', 'R']);
  const report = reliance(content, now(benchOf([H3, again(QB, { offsetDeg: 12 })]), [QB.id]));
  expect(report.voids).toEqual([{ why: 'seat-ended', plateId: QB.id, plateName: 'Q-B' }]);
  expect(report.oldDials).toBeNull();
  expect(report.targets.map(({ oldDials }) => oldDials)).toEqual([null, null]);
  expect(report.resolved).toMatchObject({ within: 2, out: 0 });
  expect(report.plates.map(({ change, zeroShiftDeg }) => [change, zeroShiftDeg])).toEqual([
    ['same', null],
    ['seat-ended', null],
  ]);
});

test('as long as a plate of the beam has no zero nothing can be re-solved, and a sentence says what waits', () => {
  const content = versionOf(benchOf([H3, QB]), ['D']);
  const waiting = benchOf([H3, QB], {
    plates: [],
    notReady: [{ plateId: QB.id, name: 'Q-B', part: 'preparation', why: 'not-calibrated' }],
  });
  const report = reliance(content, now(waiting, [QB.id]));
  expect([report.oldDials, report.resolved]).toEqual([null, null]);
  expect(report.waits).toEqual([
    'Q-B has not been calibrated since it was seated. Calibrate it, then signal arm can be used again.',
  ]);
});

test.each([
  ['another plate', [H3, plateOf(22, 'Q-D', quarter)], ['not-in-beam', 'new-in-beam']],
  ['one plate less', [H3], ['not-in-beam']],
  ['one plate more', [H3, QB, plateOf(22, 'Q-D', quarter)], ['new-in-beam']],
  ['the plates in another order', [QB, H3], ['moved', 'moved']],
  [
    'a plate whose numbers rise the other way',
    [H3, { ...QB, mount: { ...QB.mount, direction: QB.mount.direction === 1 ? -1 : 1 } } as const],
    ['numbers-turned'],
  ],
])('with %s in the beam the old dials stand for nothing', (_what, plates, whys) => {
  const content = versionOf(benchOf([H3, QB]), ['D']);
  const report = reliance(content, now(benchOf(plates)));
  expect(report.voids.map(({ why }) => why)).toEqual(whys);
  expect(report.oldDials).toBeNull();
  expect(report.resolved).not.toBeNull();
});

test('other light at the bench is felt by the same dials with the same calibrations', () => {
  const content = versionOf(benchOf([H3, QB]), ['D']);
  const report = reliance(content, now(benchOf([H3, QB], { inputExpression: 'V' })));
  expect(report.plates.map(({ change }) => change)).toEqual(['same', 'same']);
  // V is opposite to H on the sphere, and so is what becomes of it.
  expect(report.oldDials?.worst.infidelity).toBeCloseTo(1, 5);
  expect(report.stale).toBe(true);
});

test('a target that the plates no longer reach says by how much it falls short', () => {
  const content = versionOf(benchOf([QB]), ['R']);
  const report = reliance(content, now(benchOf([again(QB, { retardanceDeg: 86.9 })])));
  // One plate of 86.9° takes H at best 3.1° from the pole.
  expect(report.targets[0]?.shortfallDeg).toBeCloseTo(3.1, 9);
  expect(report.targets[0]?.resolved).toBeCloseTo(sin((1.55 * pi) / 180) ** 2, 9);
});

test('a version of unitaries is judged by its unitaries', () => {
  const bench = benchOf([plateOf(22, 'Q-A', quarter), H3, QB]);
  const frozen = freeze({
    lab: { id: id(1), name: 'A lab', convention: DEFAULT_CONVENTION },
    protocolId: id(2),
    draft: draft({ kind: 'apply', benchId: id(3), targets: [target({ expression: 'hadamard' })] }),
    bench,
    number: 1,
    parentHash: null,
    message: 'First.',
    savedAt: new Date('2026-06-16T10:42:07Z'),
    savedBy: { id: id(4), name: 'Someone' },
  });
  if (!frozen.ok) throw new Error('it freezes');
  const [first = QB] = bench.plates;
  const plates = [first, again(H3, { offsetDeg: half.offsetDeg + 1 }), QB];
  const report = reliance(frozen.content, now(benchOf(plates)));
  // A half-wave plate turned by a is the old one followed by a rotation of the sphere by 4a: ⅔ sin²(2a) on average.
  expect(report.targets[0]?.oldDials).toBeCloseTo((2 / 3) * sin((2 * pi) / 180) ** 2, 5);
  expect(report.targets[0]?.resolved).toBeLessThan(1e-7);
});

test('the rows that are done are told as they come', () => {
  const bench = benchOf([H3, QB]);
  const steps = relianceSteps(versionOf(bench, ['H', 'D', 'R']), now(bench));
  const told: number[] = [];
  for (let step = steps.next(); step.done !== true; step = steps.next()) told.push(step.value);
  expect(told).toEqual([0, 1, 2]);
});
