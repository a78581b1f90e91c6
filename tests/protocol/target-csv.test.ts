import fc from 'fast-check';
import { describe, expect, test } from 'vitest';
import {
  type Convention,
  DEFAULT_CONVENTION,
  formatState,
  formatUnitary,
  infidelityBetween,
  parseState,
} from '../../shared/optics';
import { unitaryShortfall } from '../../shared/optics/goal';
import { readRow } from '../../shared/protocol/solve-row';
import { cliffordTurns, haarStates } from '../../shared/optics/target-sets';
import { MAX_CSV_BYTES, readTargetCsv, writeTargetCsv } from '../../shared/protocol/target-csv';
import { maxLabelLength, maxTargets } from '../../shared/schemas';

const STATES = { kind: 'state', convention: DEFAULT_CONVENTION } as const;
const UNITARIES = { kind: 'unitary', convention: DEFAULT_CONVENTION } as const;

/** "line label|expression", with an ! behind what doesn't read. */
function rows(text: string, target: Parameters<typeof readTargetCsv>[1] = STATES): string[] {
  return readTargetCsv(text, target).rows.map(
    ({ line, label, expression, reading }) => `${line} ${label}|${expression}${reading === null ? ' !' : ''}`,
  );
}

describe('forms of the text', () => {
  test.each([
    ['comma, quoted', 'H1,H\r\nB,"bloch(90deg, 45deg)"\r\n', ['1 H1|H', '2 B|bloch(90deg, 45deg)']],
    [
      'comma, brackets unquoted',
      'B, bloch(90deg, 45deg)\nC, [1, i]',
      ['1 B|bloch(90deg, 45deg)', '2 C|[1, i]'],
    ],
    ['semicolon', 'a;H\nb;bloch(90deg, 45deg)\n', ['1 a|H', '2 b|bloch(90deg, 45deg)']],
    ['tab', 'a\tH\nb\t[1, i]', ['1 a|H', '2 b|[1, i]']],
    ['old line ends', 'a,H\rb,V\r', ['1 a|H', '2 b|V']],
    ['one column', 'H\nbloch(90deg, 45deg)\n\n[1, i]\n', ['1 |H', '2 |bloch(90deg, 45deg)', '4 |[1, i]']],
    ['header', 'label,expression\na,H', ['2 a|H']],
    [
      'header, other order and more columns',
      'Note; Expression ;Label\nx;[1, i];a\ny;V;b',
      ['2 a|[1, i]', '3 b|V'],
    ],
    ['header of one column', 'expression\nH\n"stokes(0, 0, 1)"', ['2 |H', '3 |stokes(0, 0, 1)']],
    ['comments and blank lines', '# made by hand, with ; and ,\n\na,H\n#b,V\n  \nc,D', ['3 a|H', '6 c|D']],
    ['line break in quotes', '"a\nb",H\nc,V', ['1 a\nb|H', '3 c|V']],
    ['doubled quotes', '"say ""a""",H', ['1 say "a"|H']],
    ['mark of the byte order', '\ufefflabel,expression\na,H', ['2 a|H']],
    ['brackets before any label', '[1, i]\nq,V', ['1 |[1, i]', '2 q|V']],
    ['nothing', '', []],
    ['only blanks', ' \n \n\n', []],
    ['only delimiters', ',\n,\n', []],
  ])('%s', (_, text, wanted) => {
    expect(rows(text)).toEqual(wanted);
    expect(readTargetCsv(text, STATES).problems).toEqual([]);
  });
});

test('an expression that does not read keeps its row, with the column inside the expression', () => {
  const { rows: found, problems } = readTargetCsv('a,H\nb,bloch(90deg; 3)\nc,V', STATES);
  expect(found.map(({ reading }) => reading?.kind ?? null)).toEqual(['state', null, 'state']);
  expect(problems).toHaveLength(1);
  expect(problems[0]?.line).toBe(2);
  expect(problems[0]?.message).toMatch(/^Column 12 of the expression: ";"/u);
  expect(readTargetCsv('a,X', STATES).problems[0]?.message).toMatch(/This is a unitary, not a state/);
  expect(readTargetCsv('a,X', UNITARIES).problems).toEqual([]);
  expect(readTargetCsv('a,H', UNITARIES).problems[0]?.message).toMatch(/The gate is written hadamard/);
});

test('rows without an expression, open quotes, long labels and long expressions are told', () => {
  expect(readTargetCsv('label,expression\na,\n', STATES).problems).toEqual([
    { line: 2, message: 'This row has no expression. The row is left out.' },
  ]);
  const wide = readTargetCsv('label,state\na,H,extra,stuff\nb,bloch(10deg, 20deg)\nc,V,,', STATES);
  expect(wide.rows.map(({ label }) => label)).toEqual(['b', 'c']);
  expect(wide.problems.map(({ line }) => line)).toEqual([2]);
  expect(wide.leftOut).toBe(1);
  expect(wide.problems[0]?.message).toMatch(/^This row has 4 cells under a header of 2\./u);
  expect(readTargetCsv('a,H\n"b,V\nc,D', STATES)).toMatchObject({
    rows: [{ label: 'a' }],
    problems: [{ line: 2 }],
  });
  const long = readTargetCsv(`${'x'.repeat(25)},H`, STATES);
  expect(long.rows[0]?.label).toHaveLength(24);
  expect(long.problems[0]?.message).toMatch(/at most 24/);
  expect(readTargetCsv(`a,${'H+'.repeat(2048)}H`, STATES)).toMatchObject({
    rows: [],
    problems: [{ line: 1 }],
  });
});

test('a label is cut between two characters, never through one, to what the draft’s schema takes', () => {
  // An emoji is two units of UTF-16: the twenty-fourth unit is the first half of the twelfth.
  const [row] = readTargetCsv(`x${'😀'.repeat(20)},H`, STATES).rows;
  expect(row?.label).toBe(`x${'😀'.repeat(11)}`);
  expect(row?.label.isWellFormed()).toBe(true);
  expect(row?.label.length).toBeLessThanOrEqual(maxLabelLength);
});

test('a text that goes on being wrong is left where it is plain that it holds no targets', () => {
  const { rows: found, problems } = readTargetCsv(`label,expression\n${'a,\n'.repeat(5000)}`, STATES);
  expect(found).toEqual([]);
  expect(problems).toHaveLength(401);
  expect(problems.at(-1)).toMatchObject({ line: 402 });
  expect(problems.at(-1)?.message).toMatch(/those below are left out/u);
});

test('a protocol’s most rows are read, and the text’s most bytes', () => {
  const many = readTargetCsv('a,H\n'.repeat(maxTargets + 5), STATES);
  expect(many.rows).toHaveLength(maxTargets);
  expect(many.problems).toHaveLength(1);
  expect(many.problems[0]?.line).toBe(maxTargets + 1);
  expect(many.problems[0]?.message).toMatch(/at most 200 targets/u);
  expect(readTargetCsv('a,H\n'.repeat(maxTargets), STATES).problems).toEqual([]);
  const inBytes = '#' + 'é'.repeat(MAX_CSV_BYTES / 2) + '\na,H';
  expect(readTargetCsv(inBytes, STATES)).toMatchObject({ rows: [], problems: [{ line: 1 }] });
  expect(rows('#' + 'e'.repeat(MAX_CSV_BYTES - 5) + '\na,H')).toEqual(['2 a|H']);
});

test('a cell that a spreadsheet would take for a formula is text, read and written', () => {
  expect(rows('=1+1,H\n@x,V\n"=HYPERLINK(""a"")",D')).toEqual(['1 =1+1|H', '2 @x|V', '3 =HYPERLINK("a")|D']);
  const text = writeTargetCsv([{ label: '=cmd()', expression: '-H' }], DEFAULT_CONVENTION);
  expect(text).toBe('# convention: kz-wt receiver L\r\nlabel,expression\r\n"\'=cmd()","\'-H"\r\n');
  expect(text).not.toMatch(/[,"\n][=+\-@]/u);
  expect(rows(text)).toEqual(['3 =cmd()|-H']);
});

const cell = fc.oneof(
  fc.string({ maxLength: 24 }),
  fc.string({ maxLength: 24, unit: 'binary' }),
  fc.string({ maxLength: 24, unit: fc.constantFrom(...Array.from(',;\t"\'#=+-@()[]\r\n aH\ufeff')) }),
);

test('what is written is read back exactly, whatever the labels and expressions hold', () => {
  fc.assert(
    fc.property(
      fc.array(fc.record({ label: cell, expression: cell.filter((text) => text.trim() !== '') }), {
        maxLength: 8,
      }),
      (written) => {
        const { rows: found } = readTargetCsv(writeTargetCsv(written, DEFAULT_CONVENTION), STATES);
        expect(found.map(({ label, expression }) => ({ label, expression }))).toEqual(written);
      },
    ),
    { numRuns: 5000 },
  );
});

test('the sets of targets go through a file unchanged, read as themselves', () => {
  const other: Convention = { phase: 'wt-kz', handedness: 'source', s3Sign: 'R' };
  for (const [set, kind] of [
    [haarStates({ count: 200, seed: 3 }, other), 'state'],
    [cliffordTurns(), 'unitary'],
  ] as const) {
    const { rows: found, problems } = readTargetCsv(writeTargetCsv(set, other), {
      kind,
      convention: other,
    });
    expect(problems).toEqual([]);
    expect(found.map(({ label, expression }) => ({ label, expression }))).toEqual(set);
  }
  const plain = parseState('D', other);
  expect(plain.ok && formatState(plain.jones, other)).toBe('D');
  expect(formatUnitary({ w: 1, x: 0, y: 0, z: 0 }, other)).toBe('identity');
});

test('any text is answered, with every row and problem on a line of it', () => {
  const text = fc.oneof(
    fc.string({ maxLength: 200, unit: fc.constantFrom(...Array.from(',;\t"#()[]\r\n aH1|>')) }),
    fc.string({ maxLength: 200, unit: 'binary' }),
  );
  fc.assert(
    fc.property(text, (source) => {
      const { rows: found, problems } = readTargetCsv(source, STATES);
      const lines = source.split(/\r\n|\r|\n/u).length;
      for (const { line } of [...found, ...problems]) {
        expect(line).toBeGreaterThanOrEqual(1);
        expect(line).toBeLessThanOrEqual(lines);
      }
    }),
    { numRuns: 5000 },
  );
});

test.each([
  ['quotes', (n: number) => '"'.repeat(n)],
  ['quoted cells', (n: number) => '"a"b'.repeat(n / 4)],
  ['open quotes', (n: number) => '"a\n'.repeat(n / 3)],
  ['delimiters', (n: number) => ','.repeat(n)],
  ['lines', (n: number) => '\n'.repeat(n)],
  ['comments', (n: number) => '#\n'.repeat(n / 2)],
  ['brackets', (n: number) => '(,'.repeat(n / 2)],
  ['rows', (n: number) => 'a,[1, i]\n'.repeat(n / 9)],
  ['long rows', (n: number) => 'a,(H+V)'.repeat(n / 7)],
])('a megabyte of %s is answered within two seconds', (_, shape) => {
  const start = performance.now();
  readTargetCsv(shape(MAX_CSV_BYTES), STATES);
  expect(performance.now() - start).toBeLessThan(2000);
});

test('a file that names another convention is translated out of it: other words, the same light', () => {
  const theirs: Convention = { phase: 'wt-kz', handedness: 'source', s3Sign: 'R' };
  for (const [set, kind] of [
    [haarStates({ count: 50, seed: 5 }, theirs), 'state'],
    [[...cliffordTurns(), { label: 'p', expression: 'qwp(20deg) hwp(70deg)' }], 'unitary'],
  ] as const) {
    const read = readTargetCsv(writeTargetCsv(set, theirs), { kind, convention: DEFAULT_CONVENTION });
    expect(read).toMatchObject({ translatedFrom: theirs, problems: [] });
    for (const [place, { reading }] of read.rows.entries()) {
      const was = readRow(set[place]?.expression ?? '', kind === 'state' ? 'prepare' : 'apply', theirs);
      if (reading === null || !was.ok) throw new Error('a row can’t be read');
      if (reading.kind === 'state' && was.reading.kind === 'state') {
        expect(infidelityBetween(reading.stokes, was.reading.stokes)).toBeLessThan(1e-20);
      } else if (reading.kind === 'unitary' && was.reading.kind === 'unitary') {
        expect(unitaryShortfall(reading.quaternion, was.reading.quaternion)).toBeLessThan(1e-20);
      } else throw new Error('a row is of another kind');
    }
  }
  // L of a lab that names hands from the source is the field that this one calls R.
  expect(rows('# convention: kz-wt source R\na,L')).toEqual(['2 a|R']);
});

test('a convention in unknown words is said at its line, and the rows are read as the lab’s own', () => {
  const read = readTargetCsv('# convention: ours\na,L', STATES);
  expect(read.translatedFrom).toBeNull();
  expect(read.rows[0]?.expression).toBe('L');
  expect(read.problems[0]?.line).toBe(1);
  expect(read.problems[0]?.message).toMatch(/kz-wt receiver L/u);
});
