import { expect, test } from 'vitest';
import {
  type Convention,
  formatState,
  formatUnitary,
  infidelityBetween,
  parseState,
  parseUnitary,
  type Quaternion,
} from '../../shared/optics';
import { unitaryShortfall } from '../../shared/optics/goal';
import { stateText, unitaryText } from './expression-generator';
import { randomStream } from './independent';

const CASES = 20_000;

const CONVENTIONS: readonly Convention[] = (['kz-wt', 'wt-kz'] as const).flatMap((phase) =>
  (['receiver', 'source'] as const).flatMap((handedness) =>
    (['R', 'L'] as const).map((s3Sign) => ({ phase, handedness, s3Sign })),
  ),
);

function lab(k: number): Convention {
  const convention = CONVENTIONS[k % CONVENTIONS.length];
  if (convention === undefined) throw new Error('no convention');
  return convention;
}

test(`${CASES} generated unitaries print canonically and read back to the same bits, in every convention`, () => {
  const random = randomStream(20_261_201);
  let [read, refused] = [0, 0];
  for (let k = 0; k < CASES; k += 1) {
    const source = unitaryText(random, k % 4);
    const first = parseUnitary(source, lab(k));
    if (!first.ok) {
      refused += 1;
      continue;
    }
    read += 1;
    const again = parseUnitary(first.canonical, lab(k));
    if (!again.ok) throw new Error(`${source} → ${first.canonical}: ${again.error.message}`);
    if (JSON.stringify(again) !== JSON.stringify(first)) {
      expect({ source, reading: again }).toEqual({ source, reading: first });
    }
  }
  // What is refused has no shortest turn, a zero vector for an axis, or a vanishing factor.
  expect(read).toBeGreaterThan(0.97 * CASES);
  expect(refused).toBeGreaterThan(0);
});

test(`${CASES} generated states, many with unitaries that act on them, read back to the same bits`, () => {
  const random = randomStream(20_261_202);
  let read = 0;
  for (let k = 0; k < CASES; k += 1) {
    const source = stateText(random, k % 4);
    const first = parseState(source, lab(k));
    if (!first.ok) continue;
    read += 1;
    const again = parseState(first.canonical, lab(k));
    if (!again.ok) throw new Error(`${source} → ${first.canonical}: ${again.error.message}`);
    if (JSON.stringify(again) !== JSON.stringify(first)) {
      expect({ source, reading: again }).toEqual({ source, reading: first });
    }
  }
  expect(read).toBeGreaterThan(0.97 * CASES);
});

test('any unitary is written in any convention as text that reads back to it within 1e-12 rad', () => {
  const random = randomStream(3);
  let worst = 0;
  for (let k = 0; k < CASES; k += 1) {
    const parts = [0, 1, 2, 3].map(() => 2 * random() - 1);
    // Every eighth is a hair's breadth from the identity, an axis or a named gate.
    const small = k % 8 === 0 ? 10 ** -(3 + 10 * random()) : 1;
    const [w = 0, x = 0, y = 0, z = 0] = parts.map((part, at) => (at === k % 4 ? part : small * part));
    const length = Math.hypot(w, x, y, z);
    const turn: Quaternion = { w: w / length, x: x / length, y: y / length, z: z / length };
    const text = formatUnitary(turn, lab(k));
    const back = parseUnitary(text, lab(k));
    if (!back.ok) throw new Error(`${text}: ${back.error.message}`);
    worst = Math.max(worst, 2 * Math.sqrt(unitaryShortfall(back.quaternion, turn)));
    const twice = formatUnitary(back.quaternion, lab(k));
    if (twice.split(',')[0] !== text.split(',')[0] && !text.startsWith('rotate([')) expect(twice).toBe(text);
  }
  expect(worst).toBeLessThan(1e-12);
  process.stdout.write(`formatUnitary and back: worst turn between them ${worst.toExponential(1)} rad\n`);
});

test('what a unitary does to light is the same whichever convention it is rewritten for', () => {
  const random = randomStream(4);
  for (let k = 0; k < 2000; k += 1) {
    const [from, to] = [lab(k), lab(Math.floor(k / 8))];
    const source = unitaryText(random, 2);
    const first = parseUnitary(source, from);
    if (!first.ok) continue;
    const rewritten = parseUnitary(formatUnitary(first.quaternion, to), to);
    if (!rewritten.ok) throw new Error(rewritten.error.message);
    expect(unitaryShortfall(rewritten.quaternion, first.quaternion)).toBeLessThan(1e-24);
    const input = parseState('ellipse(20deg, 10deg)', from);
    if (!input.ok) throw new Error(input.error.message);
    const before = parseState(`(${source}) ellipse(20deg, 10deg)`, from);
    const after = parseState(
      `(${formatUnitary(first.quaternion, to)}) (${formatState(input.jones, to)})`,
      to,
    );
    if (!before.ok || !after.ok) throw new Error(`${source} does not act on a state`);
    expect(infidelityBetween(before.stokes, after.stokes)).toBeLessThan(1e-22);
  }
});
