import { describe, expect, it } from 'vitest';
import { fitScan, type ScanToFit } from '../../../shared/scan-calibration';
import {
  type ColumnRoles,
  mappingOfRoles,
  NO_ROLES,
  withRole,
} from '../../../src/features/scan/column-roles';
import { reopenedBy, settledBy } from '../../../src/features/scan/record-rules';
import { engraved, scanFrame } from '../../../src/features/scan/scan-frame';
import { type FittedScan, plottedPoints, zeroMarks } from '../../../src/features/scan/scan-points';
import {
  distanceWords,
  movedWarning,
  movedWords,
  openWords,
  warningWords,
} from '../../../src/features/scan/scan-words';
import { linearScanText, type WrittenScan } from '../../support/scan-text';
import { plateFixture } from '../cabinet/plate-fixture';

function fitted(scan: WrittenScan, change: Partial<ScanToFit> = {}): FittedScan {
  const answer = fitScan({
    bytes: new TextEncoder().encode(linearScanText(scan)),
    columns: null,
    light: { kind: 'linear', extinction: null, power: null },
    leftOutLines: [],
    plate: plateFixture({ designWavelengthNm: 810 }),
    direction: 1,
    wavelengthNm: 810,
    temperatureC: null,
    measuredBefore: null,
    ...change,
  });
  if (answer.kind !== 'fitted') throw new Error(JSON.stringify(answer));
  return answer;
}

function standing(offsetDeg: number, openQuestions: ('axis' | 'branch' | 'blind')[] = []) {
  const { calibration } = plateFixture({ calibration: { offsetDeg, retardanceDeg: 88, openQuestions } });
  if (calibration === null) throw new Error('the plate is calibrated');
  return calibration;
}

const plain = fitted({ truth: { offsetDeg: 31.7, retardanceDeg: 88 }, seed: 2 });

describe('the window of a scan', () => {
  it('begins behind the gap that the scan leaves, and goes on over 360', () => {
    const over = fitted({ truth: { retardanceDeg: 88 }, fromDeg: 240, stepDeg: 6, count: 31, seed: 2 });
    const frame = scanFrame(plottedPoints(over), { least: 0, most: 0.5 }, 500);
    expect(frame.unwrapped(240)).toBeCloseTo(240, 6);
    expect(frame.unwrapped(60)).toBeCloseTo(420, 6);
    expect(engraved(frame.unwrapped(10))).toBeCloseTo(10, 6);
    expect(frame.x(frame.unwrapped(0))).toBeGreaterThan(frame.x(frame.unwrapped(350)));
  });

  it('has the zero at each half turn, and the other axis between while it is open', () => {
    const marks = zeroMarks(plain, 0, 360);
    expect(marks.map(({ dialDeg, isNamed }) => [Math.round(dialDeg), isNamed])).toEqual([
      [32, true],
      [212, true],
      [122, false],
      [302, false],
    ]);
    const settled = { ...plain, values: { ...plain.values, openQuestions: [] } };
    expect(zeroMarks(settled, 0, 360).every(({ isNamed }) => isNamed)).toBe(true);
  });
});

describe('what is said', () => {
  it('measures the distance from the model in σ of the measurement and with the maker’s tolerance', () => {
    expect(distanceWords(plain, 'quartz')).toMatch(
      /^\d\.\d° below what quartz gives \(90\.0°\): [\d.]+σ of the measurement, 0\.\dσ with what makers allow\.$/u,
    );
    const far = fitted({ truth: { retardanceDeg: 60 }, seed: 2 });
    expect(distanceWords(far, 'quartz')).toMatch(
      /8\.\dσ with what makers allow\. Look whether it is tilted/u,
    );
    const bare = fitted(
      { truth: { retardanceDeg: 88 }, seed: 2 },
      { plate: plateFixture({ material: null }) },
    );
    expect(distanceWords(bare, 'the model')).toMatch(/^Nothing to compare with/u);
  });

  it.each([
    [31.7, [], /^zero moved by −?0\.\d+\(\d+\)°, if the same axis is meant; retardance by/u],
    [121.7, [], /^zero moved by −?0\.\d/u],
    [211.7, ['axis'], /^zero moved by −?0\.\d/u],
    [41.7, [], /^zero moved by −(?:9\.|10\.)/u],
  ] as const)(
    'compares the zero with %d°, half a turn and while the axis is open a quarter of no matter',
    (offsetDeg, open, words) => {
      expect(movedWords(plain, standing(offsetDeg, [...open]))).toMatch(words);
    },
  );

  it('warns of a zero that moved in one seat, by no more than the two scans are known to', () => {
    expect(movedWarning(plain, standing(31.7 + 20))).toMatch(
      /^The zero moved by (19\.\d|20\.\d)\d°, \d+(\.\d)?σ, and a plate that stays in its seat keeps its zero\./u,
    );
    expect(movedWarning(plain, standing(31.7))).toBe(null);
    // A quarter turn on is the other axis, as long as nobody knows which is which.
    expect(movedWarning(plain, standing(31.7 + 90, ['axis']))).toBe(null);
  });

  it('says of each open question what it is and what settles it', () => {
    const blind = fitted(
      { truth: { retardanceDeg: 179.6 }, seed: 3 },
      { plate: plateFixture({ kind: 'half', designWavelengthNm: 810 }) },
    );
    const said = blind.found.fit.open.map((question) => openWords(question, blind));
    expect(said.map(({ head }) => head)).toEqual([
      'Fast or slow?',
      expect.stringMatching(/° or .*°\?/u),
      'Near 180° the retardance is hardly felt',
    ]);
    expect(said[1]?.text).toContain('For a half-wave plate the design lies where the two meet');
    expect(said.every(({ ways }) => ways !== '')).toBe(true);
    const one = fitted({ ports: 'parallel', seed: 4 });
    expect(one.found.fit.open.map((question) => openWords(question, one).ways).at(-1)).toMatch(
      /^State the extinction or the power that enters/u,
    );
  });

  it('says each warning in a plain sentence', () => {
    const say = (kind: 'misfit' | 'other-light' | 'over-full' | 'negative-leak') =>
      warningWords({ kind, sigmas: 6.2 }, plain);
    expect(say('misfit')).toContain('6.2σ too much');
    expect(say('other-light')).toContain('No plate makes these powers of the light that is stated');
    expect(say('over-full')).toContain('ports are swapped');
    expect(say('negative-leak')).toContain('dark level');
    const harmonic = { perTurn: 1, hint: 'wedge-or-decentre', amplitude: 0.01, sigmas: 12 } as const;
    expect(warningWords({ kind: 'fault-harmonic', sigmas: 12, harmonic }, plain)).toContain(
      'once a turn, by 12σ',
    );
  });
});

describe('rules', () => {
  it('settle what the standing calibration left open, and say what would be open again', () => {
    const both = standing(31.7, ['axis', 'branch']);
    expect(settledBy(plain, both)).toBe(both.id);
    expect(settledBy(plain, standing(31.7, ['axis']))).toBe(null);
    expect(settledBy(plain, null)).toBe(null);
    expect(reopenedBy(plain, standing(31.7))).toBe(true);
    expect(reopenedBy(plain, both)).toBe(false);
  });

  it('keep one column in one role and one role in one column', () => {
    const roles: ColumnRoles = withRole(withRole(NO_ROLES, 0, 'dial'), 1, 'crossed');
    expect(mappingOfRoles(roles).ok).toBe(true);
    const moved = withRole(roles, 1, 'dial');
    expect([moved.dial?.column, moved.crossed]).toEqual([1, null]);
    const sigma = withRole(roles, 2, 'parallelSigma');
    const lacks = mappingOfRoles(sigma);
    expect(lacks.ok ? '' : lacks.problem).toContain('no parallel power');
  });
});
