import { expect, test } from 'vitest';
import { MAX_SCAN_BYTES, MAX_SCAN_ROWS, MOST_FAULTS, readScanFile } from '../../shared/scan-file';
import { faultsOf } from './scan-file-readings';

const HEAD = 'angle (deg),crossed (mW),parallel (mW)\n';
const bytesOf = (text: string): Uint8Array => new TextEncoder().encode(text);

test('a file above 10 MB is refused before anything is read', () => {
  const { faults } = faultsOf(new Uint8Array(MAX_SCAN_BYTES + 1));
  expect(faults[0]?.what).toBe('This file has 10.0 MB; the most is 10 MB.');
});

test('the first fifty faults are listed in order and the others counted', () => {
  const { faults, moreFaults } = faultsOf(bytesOf(`${HEAD}0,1,2\n${'5,nan,3\n'.repeat(120)}`));
  expect(faults.map(({ line }) => line)).toEqual(Array.from({ length: MOST_FAULTS }, (_, at) => at + 3));
  expect(moreFaults).toBe(70);
});

test('faults in cells come with the file as it was understood, so that another column can be chosen', () => {
  const { understood } = faultsOf(bytesOf(`${HEAD}0,1,2\n5,nan,3\n`));
  expect(understood?.preview.rows).toHaveLength(2);
  expect(understood?.proposal.columns.crossed).toBe(1);
});

function rowsOf(count: number): Uint8Array {
  const rows = Array.from({ length: count }, (_, at) => `${at / 8};${at * 1.5};${1e6 - at};0.5;0.25`);
  return bytesOf(`angle (deg);crossed (mW);parallel (mW);err crossed;err parallel\n${rows.join('\n')}\n`);
}

test('one row more than the most is refused at its line', () => {
  const most = readScanFile(rowsOf(MAX_SCAN_ROWS));
  expect(most.kind === 'table' && most.points.length).toBe(MAX_SCAN_ROWS);
  const { faults } = faultsOf(rowsOf(MAX_SCAN_ROWS + 1));
  expect(faults).toMatchObject([{ line: MAX_SCAN_ROWS + 2, what: 'This file has more than 100000 rows.' }]);
});

/** Of this process, so that what else the machine does doesn't count. */
function cpuMs(work: () => void): number {
  const start = process.cpuUsage();
  work();
  const { user, system } = process.cpuUsage(start);
  return (user + system) / 1000;
}

/**
 * The fastest reading of each file. The files take turns, after one round to warm up: compilation and the heap's growth
 * weigh on whichever comes first, and by chance made one file's fastest twice as slow as it is.
 */
function fastestMs(counts: readonly number[]): number[] {
  const files = counts.map(rowsOf);
  const rounds = Array.from({ length: 8 }, () => files.map((bytes) => cpuMs(() => readScanFile(bytes))));
  return files.map((_, at) => Math.min(...rounds.slice(1).map((round) => round[at] ?? Infinity)));
}

test('ten thousand rows take less than 300 ms, and eight times as many at most 16 times as long', () => {
  const [few = NaN, many = NaN] = fastestMs([10_000, 80_000]);
  expect(few).toBeLessThan(300);
  expect(many / few).toBeLessThan(16);
});

const FILL = 1_000_000;
const long = (text: string): string => text.repeat(FILL / text.length);
test.each([
  ['line breaks', long('\n')],
  ['one line of digits', long('7')],
  ['lines of digits', long(`${'7'.repeat(3999)}\n`)],
  ['lines of commas', long(`${','.repeat(3999)}\n`)],
  ['lines of quotes', long(`${'"'.repeat(3999)}\n`)],
  ['lines of brackets above a row', `${long(`${'('.repeat(3997)},(\n`)}1,2\n`],
  ['lines of blanks and signs', long(`0${' -'.repeat(1999)}\n`)],
  ['digits and points', long(`${'1.'.repeat(1999)}x\n`)],
  ['groups of thousands', long(`1${',000'.repeat(999)}x\n`)],
  ['comments', long('# a crossed (W), b, parallel\n')],
  ['lines drawn', long('-- -- --\n')],
  ['bytes that are no text', long('\u0080')],
])('a megabyte of %s is refused within a second', (_, text) => {
  const bytes = bytesOf(text);
  expect(cpuMs(() => faultsOf(bytes))).toBeLessThan(1000);
});
