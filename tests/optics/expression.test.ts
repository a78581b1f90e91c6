import fc from 'fast-check';
import { expect, test } from 'vitest';
import {
  type Convention,
  DEFAULT_CONVENTION,
  formatState,
  infidelityBetween,
  type JonesVector,
  MAX_LENGTH,
  parseState,
  type StateReading,
} from '../../shared/optics';

type Read = Extract<StateReading, { ok: true }>;

function read(source: string, convention = DEFAULT_CONVENTION): Read {
  const reading = parseState(source, convention);
  if (!reading.ok) throw new Error(`${source}: column ${reading.error.column}: ${reading.error.message}`);
  return reading;
}

function complaint(source: string): string {
  const reading = parseState(source, DEFAULT_CONVENTION);
  if (reading.ok) throw new Error(`${source} was read as ${reading.canonical}`);
  return `Column ${reading.error.column}: ${reading.error.message}`;
}

function sameState(one: string, other: string): void {
  expect(infidelityBetween(read(one).stokes, read(other).stokes), `${one} = ${other}`).toBeLessThan(1e-29);
}

test('every way of writing the six named states is the same state', () => {
  for (const [name, ...others] of [
    ['H', '|H>', '|0>', '|0⟩', '[1, 0]', 'linear(0deg)', 'bloch(0deg, 77deg)', 'stokes(1, 0, 0)', '3 H'],
    ['V', '|1>', '[0, -2i]', 'linear(−90°)', 'bloch(pi, 0 rad)', 'iV', '|V〉'],
    ['D', '|+>', 'H + V', '(H+V)/√2', 'linear(45°)', 'bloch(90deg, 0deg)', '1/√2·(|0⟩ + |1⟩)', 'V + H'],
    ['A', '|->', '|−>', 'H − V', 'linear(135deg)', 'V - H', 'stokes(0, -1, 0)', 'bloch(90°,180°)'],
    ['L', '|+i>', '(H + i V)/sqrt(2)', 'stokes(0, 0, 1)', 'ellipse(12deg, 45deg)', 'V - iH', '[i, -1]'],
    ['R', '|-i>', '(|H> - i|V>)/2^(1/2)', 'bloch(pi/2, -π/2)', 'H + e^(-i 90deg) V', 'H + i^3 V'],
  ]) {
    if (name === undefined) throw new Error('no name');
    for (const other of others) sameState(name, other);
  }
});

test('products bind from left to right, powers first, and a sign before a power is the power’s', () => {
  sameState('1/2 i H + 1/2 V', 'iH + V');
  sameState('H - 2^2 V', 'H - 4V');
  sameState('H + 2*3 V/6', 'D');
  sameState('H + 2^-1 V', '2H + V');
  sameState('H + 4^2^-1 V', 'H + 4^(2^-1) V');
  sameState('cos(22.5deg) H + e^(i 45°) sin(22.5deg) V', 'bloch(45deg, 45deg)');
  sameState('exp(-0.5) H + V', 'H + e^(1/2) V');
  sameState('cos(pi/4 + 10deg)H + sin(55deg)V', 'linear(55deg)');
  sameState('L + R', 'H');
});

test('the norm as written is kept beside the normalised state', () => {
  expect(read('H + V').norm).toBeCloseTo(Math.SQRT2, 15);
  expect(read('H + V').normalised).toBe(true);
  expect(read('(H + iV)/sqrt(2)').normalised).toBe(false);
  expect(read('1e-200 H').norm).toBeCloseTo(1e-200, 210);
  expect(read('stokes(0.577, 0.577, 0.577)').norm).toBeCloseTo(Math.sqrt(0.577 * Math.sqrt(3)), 12);
});

test('errors say what, where and what to do, in the product’s words', () => {
  const asked = 'cos(22.5) H + sin(22.5deg) V';
  expect(complaint(asked)).toBe('Column 5: 22.5 of what? Write 22.5deg or 22.5rad.');
  const reading = parseState(asked, DEFAULT_CONVENTION);
  expect(reading.ok ? null : reading.error).toEqual({
    column: 5,
    length: 4,
    message: '22.5 of what? Write 22.5deg or 22.5rad.',
    suggestion: '22.5deg',
  });
  expect(complaint('bloch(1 + 2, 0deg)')).toBe('Column 7: 1 + 2 of what? Write (1 + 2)deg or (1 + 2)rad.');
  expect(complaint('H + exp(i 45) V')).toBe('Column 9: i 45 of what? Write i 45deg or i 45rad.');
  expect(complaint('ellipse(10deg, 5)')).toMatch(/^Column 16: 5 of what\?/);
  expect(complaint('stokes(0.3, 0, 0.4)')).toMatch(/^Column 1: .*degree of polarisation 0\.5\./);
  expect(complaint('stokes(0, 0, 0)')).toMatch(/unpolarised/);
  expect(complaint('stokes(1, 1, 0)')).toMatch(/1\.4142 long/);
  expect(complaint('H - H')).toMatch(/^Column 1: Nothing is left/);
  expect(complaint('0.1H + 0.2H - 0.3H')).toMatch(/Nothing is left/);
  expect(complaint('[0, 0]')).toMatch(/Nothing is left/);
  expect(complaint('')).toMatch(/^Column 1: Nothing is written/);
  expect(complaint('(H + V')).toMatch(/^Column 1: This bracket is not closed/);
  expect(complaint('H + V)')).toMatch(/^Column 6: This \) closes nothing/);
  expect(complaint('H V')).toMatch(/^Column 3: Two states/);
  expect(complaint('H + 1')).toMatch(/^Column 5: A number can’t be added/);
  expect(complaint('H/V')).toMatch(/^Column 3: A state can’t be divided by/);
  expect(complaint('1/0 H')).toMatch(/^Column 3: .*divides by zero/);
  expect(complaint('1e308*1e308 H')).toMatch(/^Column 7: This is too large/);
  expect(complaint('1e309 H')).toMatch(/^Column 1: This number is too large/);
  expect(complaint('0.5')).toMatch(/^Column 1: This is a number, not a state/);
  expect(complaint('45deg')).toMatch(/an angle, not a state/);
  expect(complaint('45deg H')).toMatch(/^Column 7: An angle can’t weigh a state/);
  expect(complaint('45deg deg')).toMatch(/a unit twice/);
  expect(complaint('linear(2i deg)')).toMatch(/An angle must be real/);
  expect(complaint('linear(1e9 deg)')).toMatch(/many thousand turns/);
  expect(complaint('ellipse(0deg, 46deg)')).toMatch(/from −45° to 45°/);
  expect(complaint('[1, 2, 3]')).toMatch(/^Column 6: A column has two parts/);
  expect(complaint('[1]')).toMatch(/^Column 3: A column has two parts/);
  expect(complaint('[H, V]')).toMatch(/^Column 2: A state stands here/);
  expect(complaint('bloch(90deg)')).toMatch(/bloch takes 2 arguments and has 1/);
  expect(complaint('bloch(90deg, 0deg, 1deg)')).toMatch(/^Column 18: /);
  expect(complaint('sqrt 2')).toMatch(/^Column 1: sqrt takes its argument in brackets/);
  expect(complaint('H + |q>')).toMatch(/^Column 5: There is no ket named "q"/);
  expect(complaint('H + |+i')).toMatch(/^Column 5: This ket is not closed/);
  expect(complaint('2 3 H')).toMatch(/^Column 3: Two numbers/);
  expect(complaint('H +')).toMatch(/^Column 3: The expression ends/);
  expect(complaint('H + * V')).toMatch(/^Column 5: Something is missing/);
  expect(complaint('H, V')).toMatch(/^Column 2: A comma/);
  expect(complaint('H + h')).toBe('Column 5: "h" is no name here. Write the state as H.');
  expect(complaint('H + jV')).toMatch(/^Column 5: "jV" is no name here/);
  expect(complaint('H + j V')).toBe('Column 5: The imaginary unit is written i here.');
  expect(complaint('linear(5 degrees)')).toMatch(/written deg here/);
  expect(complaint('H + ١V')).toMatch(/^Column 5: "١" has no meaning here/);
  expect(complaint('H\u0000')).toMatch(/^Column 2: A control character/);
  expect(complaint('2^0.3 H')).toMatch(/^Column 3: Powers are whole or half numbers/);
  expect(complaint('2^H')).toMatch(/^Column 3: A state stands here/);
});

test('limits are named at their place: length, depth and number of parts', () => {
  expect(complaint(`${'H+'.repeat(MAX_LENGTH / 2)}H`)).toMatch(/^Column 4097: This is 4097 characters long/);
  expect(complaint(`${'('.repeat(101)}H${')'.repeat(101)}`)).toMatch(/nested deeper than 100 levels/);
  expect(read(`${'('.repeat(99)}H${')'.repeat(99)}`).canonical).toBe('H');
  expect(complaint(`${'-'.repeat(400)}H`)).toMatch(/nested deeper/);
  expect(complaint(`${'√'.repeat(400)}2 H`)).toMatch(/nested deeper/);
  expect(complaint(`2${'^2'.repeat(400)} H`)).toMatch(/nested deeper/);
  expect(complaint(`H${'+H'.repeat(2000)}`)).toMatch(/more than 2000/);
});

test('the canonical text is one way to write each tree and reads back to the same bits', () => {
  for (const [source, canonical] of [
    ['  ( H+i V )/sqrt( 2 ) ', '(H + i V)/sqrt(2)'],
    ['√2·|0⟩−π|−i⟩', 'sqrt(2)*|0> - pi |-i>'],
    ['22.50°H'.replace('H', ''), null],
    ['linear(22.50°)', 'linear(22.5deg)'],
    ['[1,i]', '[1, i]'],
    ['-(H)', '-H'],
    ['+H', 'H'],
    ['H - (V - D)', 'H - (V - D)'],
    ['2(3 H)', '2 (3 H)'],
    ['2(3)(4^2)H', '2 (3) (4^2) H'],
    ['(2 3^2', null],
    ['e^(i 45deg)H+V', 'e^(i 45deg) H + V'],
  ] as const) {
    if (canonical === null) expect(parseState(source, DEFAULT_CONVENTION).ok).toBe(false);
    else expect(read(source).canonical).toBe(canonical);
  }
});

const numberText = fc.oneof(
  fc.integer({ min: 0, max: 99 }).map(String),
  fc.double({ min: 1e-6, max: 1e6, noNaN: true }).map(String),
  fc.constantFrom('pi', 'i', 'sqrt(2)', '√3', '2i', 'e', '(1 - 2i)'),
);
const angleText = fc
  .tuple(fc.double({ min: -180, max: 180, noNaN: true }), fc.constantFrom('deg', '°', 'rad', ' deg'))
  .map(([size, unit]) => `${String(size)}${unit}`);
const smallAngle = fc.double({ min: -45, max: 45, noNaN: true }).map((size) => `${String(size)}deg`);
const { state: stateText } = fc.letrec<{ state: string; weight: string }>((tie) => ({
  weight: fc.oneof(
    { depthSize: 'small' },
    numberText,
    angleText.map((angle) => `cos(${angle})`),
    angleText.map((angle) => `e^(i (${angle}))`),
    fc
      .tuple(tie('weight'), fc.constantFrom('*', ' ', '/', '+', ' - '), tie('weight'))
      .map(([a, op, b]) => `(${a})${op}(${b})`),
    fc.tuple(tie('weight'), fc.constantFrom('2', '-1', '(1/2)')).map(([a, power]) => `(${a})^${power}`),
  ),
  state: fc.oneof(
    { depthSize: 'small' },
    fc.constantFrom('H', 'V', 'D', 'A', 'L', 'R', '|0>', '|1⟩', '|+>', '|->', '|+i>', '|−i⟩'),
    fc.tuple(angleText, angleText).map(([a, b]) => `bloch(${a}, ${b})`),
    fc.tuple(angleText, smallAngle).map(([a, b]) => `ellipse(${a}, ${b})`),
    angleText.map((angle) => `linear(${angle})`),
    fc.tuple(tie('weight'), tie('weight')).map(([a, b]) => `[${a}, ${b}]`),
    fc
      .tuple(tie('state'), fc.constantFrom(' + ', '-', '+'), tie('state'))
      .map(([a, op, b]) => `(${a}${op}${b})`),
    fc.tuple(tie('weight'), tie('state')).map(([a, b]) => `(${a}) (${b})`),
    fc.tuple(tie('state'), tie('weight')).map(([a, b]) => `-(${a})/(${b})`),
  ),
}));
const convention = fc.record<Convention>({
  phase: fc.constantFrom('kz-wt', 'wt-kz'),
  handedness: fc.constantFrom('receiver', 'source'),
  s3Sign: fc.constantFrom('R', 'L'),
});

test('printing and reading again gives the same bits and the same text, in every convention', () => {
  let readable = 0;
  fc.assert(
    fc.property(stateText, convention, (source, lab) => {
      const first = parseState(source, lab);
      if (!first.ok) return;
      readable += 1;
      const again = parseState(first.canonical, lab);
      if (!again.ok) throw new Error(`${first.canonical}: ${again.error.message}`);
      expect(again.jones).toEqual(first.jones);
      expect(again.norm).toBe(first.norm);
      expect(again.canonical).toBe(first.canonical);
      expect(again.latex).toBe(first.latex);
    }),
    { numRuns: 3000 },
  );
  expect(readable).toBeGreaterThan(2000);
});

test('any state is written in any convention and reads back as itself', () => {
  const part = fc.double({ min: -1, max: 1, noNaN: true });
  fc.assert(
    fc.property(part, part, part, part, convention, (aRe, aIm, bRe, bIm, lab) => {
      const jones: JonesVector = { aRe, aIm, bRe, bIm };
      fc.pre(Math.hypot(aRe, aIm, bRe, bIm) > 1e-3);
      const text = formatState(jones, lab);
      const back = read(text, lab);
      // A quarter of 1e-12 rad squared, the distance that formatState promises.
      expect(infidelityBetween(back.stokes, read(formatState(back.jones, lab), lab).stokes)).toBeLessThan(
        2.5e-25,
      );
      expect(formatState(back.jones, lab).split('(')[0]).toBe(text.split('(')[0]);
    }),
    { numRuns: 1000 },
  );
  expect(formatState({ aRe: 1, aIm: 0, bRe: 0, bIm: 1 }, DEFAULT_CONVENTION)).toBe('L');
  expect(formatState({ aRe: 0, aIm: 3, bRe: 0, bIm: 3 }, DEFAULT_CONVENTION)).toBe('D');
  expect(formatState(read('ellipse(20deg, -10deg)').jones, DEFAULT_CONVENTION)).toBe(
    'ellipse(20deg, -10deg)',
  );
  expect(formatState(read('linear(22.5deg)').jones, DEFAULT_CONVENTION)).toBe('linear(22.5deg)');
});

/** Without the empty delimiters that only set the gap beside a bracket. */
function latexOf(source: string): string {
  return read(source).latex.replaceAll('\\mathopen{}', '').replaceAll('\\mathclose{}', '');
}

test('the TeX of an expression carries the factor in front and nothing of the source', () => {
  expect(latexOf('(H + i V)/sqrt(2)')).toBe('\\frac{1}{\\sqrt{2}}\\left(|H\\rangle+i\\,|V\\rangle\\right)');
  // A long number is cut with dots where it is typeset, never rounded to another one.
  expect(latexOf('0.6400438558471234 H + 12.345678901234 V')).toContain('0.64004\\ldots');
  expect(latexOf('0.6400438558471234 H + 12.345678901234 V')).toContain('12.345\\ldots');
  expect(latexOf('0.00012345678912 H + V')).toContain('0.00012345\\ldots');
  expect(latexOf('0.3333 H + 109.4712 V')).toContain('109.4712');
  expect(latexOf('bloch(109.47deg, 120deg)')).toBe(
    '\\mathrm{bloch}\\left(109.47^{\\circ},\\ 120^{\\circ}\\right)',
  );
  expect(latexOf('cos(22.5deg) H')).toBe('\\cos 22.5^{\\circ}\\,|H\\rangle');
});
