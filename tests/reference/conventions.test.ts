import { afterAll, expect, test } from 'vitest';
import {
  circularState,
  type Convention,
  CONVENTION_SETS,
  describeState,
  letterOf,
  sameConvention,
  showStokes,
  stokesToJones,
  translateJones,
} from '../../shared/optics';
import { Deviations } from './deviations';

const deviations = new Deviations();
afterAll(() => deviations.print('Conventions against their sources (references.md 3.3), worst deviation'));

type Sense = 'clockwise' | 'counter-clockwise';
type Complex = readonly [re: number, im: number];

/**
 * The turn of the real field at z = 0 in a plane with x to the right and y up, from cos(kz − ωt) or cos(ωt − kz) alone:
 * the sign of Ex dEy − Ey dEx over one period, counter-clockwise where it is positive. The receiver sees this plane so.
 */
function fieldSense(phase: Convention['phase'], [a, b]: readonly [Complex, Complex]): Sense {
  const part = ([re, im]: Complex, wt: number) => {
    const [size, angle] = [Math.hypot(re, im), Math.atan2(im, re)];
    // e^{i(kz − ωt)} at z = 0 is e^{−iωt}; e^{i(ωt − kz)} is e^{+iωt}. A real part is what a detector would see.
    return size * Math.cos(phase === 'kz-wt' ? angle - wt : angle + wt);
  };
  let swept = 0;
  for (let k = 0; k < 360; k += 1) {
    const [now, then] = [(k * Math.PI) / 180, ((k + 1) * Math.PI) / 180];
    swept += part(a, now) * part(b, then) - part(b, now) * part(a, then);
  }
  return swept > 0 ? 'counter-clockwise' : 'clockwise';
}

/** Along the propagation one looks at the same plane from behind. */
const fromBehind = (sense: Sense): Sense => (sense === 'clockwise' ? 'counter-clockwise' : 'clockwise');

const RIGHT_MINUS: readonly [Complex, Complex] = [
  [Math.SQRT1_2, 0],
  [0, -Math.SQRT1_2],
];
const RIGHT_PLUS: readonly [Complex, Complex] = [
  [Math.SQRT1_2, 0],
  [0, Math.SQRT1_2],
];

interface Claim {
  readonly source: string;
  readonly set: string;
  /** `null`: the source doesn't say. */
  readonly phase: Convention['phase'] | null;
  /** How "right" turns, in the view the source takes. */
  readonly right: { readonly view: 'receiver' | 'source'; readonly turns: Sense } | null;
  readonly rightJones: readonly [Complex, Complex] | null;
  readonly s3OfRight: 1 | -1 | null;
}

const receiverClockwise = { view: 'receiver', turns: 'clockwise' } as const;
const sourceClockwise = { view: 'source', turns: 'clockwise' } as const;

// references.md 3.3, row by row; tags (read, from memory) as there and in the set.
const CLAIMS: readonly Claim[] = [
  {
    source: 'Hecht',
    set: 'receiver-optics-kz',
    phase: 'kz-wt',
    right: receiverClockwise,
    rightJones: RIGHT_MINUS,
    s3OfRight: 1,
  },
  {
    source: 'Wyant',
    set: 'receiver-optics-kz',
    phase: 'kz-wt',
    right: null,
    rightJones: RIGHT_MINUS,
    s3OfRight: null,
  },
  {
    source: 'Chipman',
    set: 'receiver-optics-kz',
    phase: 'kz-wt',
    right: receiverClockwise,
    rightJones: RIGHT_MINUS,
    s3OfRight: 1,
  },
  {
    source: 'Landolfi',
    set: 'receiver-optics-kz',
    phase: null,
    right: receiverClockwise,
    rightJones: null,
    s3OfRight: 1,
  },
  {
    source: 'Goldstein',
    set: 'receiver-optics-wt',
    phase: 'wt-kz',
    right: receiverClockwise,
    rightJones: RIGHT_PLUS,
    s3OfRight: 1,
  },
  {
    source: 'Collett',
    set: 'receiver-optics-wt',
    phase: 'wt-kz',
    right: receiverClockwise,
    rightJones: RIGHT_PLUS,
    s3OfRight: 1,
  },
  {
    source: 'Schaefer',
    set: 'receiver-optics-wt',
    phase: 'wt-kz',
    right: receiverClockwise,
    rightJones: RIGHT_PLUS,
    s3OfRight: 1,
  },
  {
    source: 'Wolf',
    set: 'receiver-optics-wt',
    phase: 'wt-kz',
    right: receiverClockwise,
    rightJones: RIGHT_PLUS,
    s3OfRight: 1,
  },
  // Jackson names the other one: left = (1, +i), s3 = +1 for it; so right is (1, −i) with s3 = −1.
  {
    source: 'Jackson',
    set: 'positive-helicity',
    phase: 'kz-wt',
    right: receiverClockwise,
    rightJones: RIGHT_MINUS,
    s3OfRight: -1,
  },
  {
    source: 'Munro',
    set: 'qubit-measurement-2001',
    phase: null,
    right: null,
    rightJones: RIGHT_MINUS,
    s3OfRight: 1,
  },
  {
    source: 'IUPAC',
    set: 'receiver-vocabularies',
    phase: null,
    right: receiverClockwise,
    rightJones: null,
    s3OfRight: null,
  },
  {
    source: 'CIE e-ILV',
    set: 'receiver-vocabularies',
    phase: null,
    right: receiverClockwise,
    rightJones: null,
    s3OfRight: null,
  },
  {
    source: '845-21-019',
    set: 'receiver-vocabularies',
    phase: null,
    right: receiverClockwise,
    rightJones: null,
    s3OfRight: null,
  },
  {
    source: 'IEEE Std 149',
    set: 'ieee-source',
    phase: null,
    right: sourceClockwise,
    rightJones: null,
    s3OfRight: null,
  },
  {
    source: 'IEEE Std 145',
    set: 'ieee-source',
    phase: null,
    right: sourceClockwise,
    rightJones: null,
    s3OfRight: null,
  },
  {
    source: '1037C',
    set: 'ieee-source',
    phase: null,
    right: sourceClockwise,
    rightJones: null,
    s3OfRight: null,
  },
  {
    source: 'antennas',
    set: 'ieee-source',
    phase: null,
    right: sourceClockwise,
    rightJones: null,
    s3OfRight: null,
  },
  {
    source: 'IAU Commission 40',
    set: 'iau-1974',
    phase: null,
    right: sourceClockwise,
    rightJones: null,
    s3OfRight: 1,
  },
  {
    source: 'particle physics',
    set: 'particle-helicity',
    phase: 'kz-wt',
    right: { view: 'receiver', turns: 'counter-clockwise' },
    rightJones: RIGHT_PLUS,
    s3OfRight: null,
  },
];

function setOf(id: string) {
  const found = CONVENTION_SETS.find((set) => set.id === id);
  if (found === undefined) throw new Error(`${id} is missing`);
  return found;
}

function writtenRight(convention: Convention): readonly [Complex, Complex] {
  const { aRe, aIm, bRe, bIm } = translateJones(stokesToJones(circularState('R', convention)), convention);
  return [
    [aRe, aIm],
    [bRe, bIm],
  ];
}

// references.md 3.3, last line: (1, +i) with e^{−iωt} turns counter-clockwise for the receiver, and so does (1, −i) with e^{+iωt}.
test('the field of (1, ±i) turns as the physical statement that settles all says', () => {
  expect(fieldSense('kz-wt', RIGHT_PLUS)).toBe('counter-clockwise');
  expect(fieldSense('wt-kz', RIGHT_MINUS)).toBe('counter-clockwise');
  expect(fieldSense('kz-wt', RIGHT_MINUS)).toBe('clockwise');
  expect(fieldSense('wt-kz', RIGHT_PLUS)).toBe('clockwise');
});

test.each(CLAIMS)('$source: phase, Jones vector, turning and S3 of R are those of the set $set', (claim) => {
  const set = setOf(claim.set);
  const { convention } = set;
  const named = set.sources.find(({ text }) => text.toLowerCase().includes(claim.source.toLowerCase()));
  expect(named, 'the set names the source').toBeDefined();
  if (claim.phase !== null) expect(convention.phase).toBe(claim.phase);
  // The real field of what the set writes for R, in the set's own phase.
  const right = writtenRight(convention);
  const seenByReceiver = fieldSense(convention.phase, right);
  expect(describeState(circularState('R', convention), convention).rotation).toBe(seenByReceiver);
  if (claim.right !== null) {
    const { view, turns } = claim.right;
    expect(view === 'receiver' ? seenByReceiver : fromBehind(seenByReceiver)).toBe(turns);
  }
  if (claim.rightJones !== null) {
    const [[ar, ai], [br, bi]] = claim.rightJones;
    const deviation = Math.hypot(right[0][0] - ar, right[0][1] - ai, right[1][0] - br, right[1][1] - bi);
    expect(deviations.note('Jones vector of R as each source of 3.3 writes it', deviation)).toBeLessThan(
      1e-15,
    );
    // What the source itself writes turns as the source itself says.
    if (claim.phase !== null && claim.right?.view === 'receiver') {
      expect(fieldSense(claim.phase, claim.rightJones)).toBe(claim.right.turns);
    }
  }
  if (claim.s3OfRight !== null) {
    const shown = showStokes(circularState('R', convention), convention).s3;
    expect(
      deviations.note('Sign of S3 of R as each source of 3.3 has it', Math.abs(shown - claim.s3OfRight)),
    ).toBe(0);
  }
  const settled = [...(named?.read ?? []), ...(named?.recalled ?? [])];
  expect(settled.includes('s3Sign'), 'S3 is settled where the source says it').toBe(claim.s3OfRight !== null);
  expect(settled.includes('phase')).toBe(claim.phase !== null);
  // With a phase a Jones vector settles the turning too; alone it settles neither.
  const turning = claim.right !== null || (claim.phase !== null && claim.rightJones !== null);
  expect(settled.includes('handedness')).toBe(turning);
});

test('every source that a set names is a row of the table above', () => {
  for (const { id, sources } of CONVENTION_SETS) {
    for (const { text } of sources) {
      const row = CLAIMS.find(
        ({ set, source }) => set === id && text.toLowerCase().includes(source.toLowerCase()),
      );
      expect(row, text).toBeDefined();
    }
  }
});

test('each set says which flags its sources leave open, and whether they were read', () => {
  const facts = CONVENTION_SETS.map(({ id, notFixedBySource, checked }) => [id, notFixedBySource, checked]);
  expect(facts).toEqual([
    ['positive-helicity', [], 'from memory'],
    ['receiver-optics-kz', [], 'read'],
    ['receiver-optics-wt', [], 'from memory'],
    ['receiver-vocabularies', ['phase', 's3Sign'], 'read'],
    ['ieee-source', ['phase', 's3Sign'], 'read'],
    ['iau-1974', ['phase'], 'from memory'],
    ['particle-helicity', ['s3Sign'], 'from memory'],
    ['qubit-measurement-2001', ['phase', 'handedness'], 'from memory'],
  ]);
});

// The line below the table of 3.3: S3 of the light that turns counter-clockwise for the receiver.
test('counter-clockwise light has S3 = −1 with Hecht’s table, Goldstein, Born & Wolf and James, +1 with Jackson and IAU V', () => {
  for (const [id, s3, letter] of [
    ['receiver-optics-kz', -1, 'L'],
    ['receiver-optics-wt', -1, 'L'],
    ['qubit-measurement-2001', -1, 'L'],
    ['positive-helicity', 1, 'L'],
    ['iau-1974', 1, 'R'],
    ['particle-helicity', 1, 'R'],
  ] as const) {
    const { convention } = setOf(id);
    expect(showStokes([0, 0, 1], convention).s3, id).toBe(s3);
    expect(letterOf([0, 0, 1], convention), id).toBe(letter);
  }
});

test('a lab’s flags are told by the names of all the sets that share them', () => {
  const sharing = (flags: Convention) =>
    CONVENTION_SETS.filter(({ convention }) => sameConvention(convention, flags)).map(({ id }) => id);
  expect(sharing({ phase: 'wt-kz', handedness: 'source', s3Sign: 'R' })).toEqual(['ieee-source', 'iau-1974']);
  expect(sharing({ phase: 'wt-kz', handedness: 'receiver', s3Sign: 'L' })).toEqual([]);
});
