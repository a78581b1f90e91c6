import { expect, test } from 'vitest';
import { describeFault } from '../../shared/scan-file';
import { faultsOf } from './scan-file-readings';
import { encoded } from './scan-file-writer';

const HEAD = 'angle (deg),crossed (mW),parallel (mW)\n';
const SOUND = `${HEAD}0,1,2\n5,2,3\n`;

function bytesOf(content: string | readonly number[]): Uint8Array {
  return typeof content === 'string' ? new TextEncoder().encode(content) : Uint8Array.from(content);
}

const ascii = (text: string): readonly number[] => Array.from(text, (character) => character.charCodeAt(0));

type Hostile = readonly [name: string, content: string | readonly number[], place: string, words: RegExp];

const OTHER_FILES: readonly Hostile[] = [
  ['PNG', [0x89, ...ascii('PNG\r\n'), 0x1a, 10, 0, 0], 'Line 1', /a PNG picture/u],
  ['JPEG', [0xff, 0xd8, 0xff, 0xe0], 'Line 1', /a JPEG picture/u],
  ['ZIP', [...ascii('PK'), 3, 4, 20, 0, ...ascii('scan.csv')], 'Line 1', /a ZIP archive/u],
  ['new spreadsheet', [...ascii('PK'), 3, 4, 20, 0, ...ascii('[Content_Types].xml')], 'Line 1', /\.xlsx/u],
  [
    'open spreadsheet',
    [...ascii('PK'), 3, 4, 20, 0, ...ascii('mimetypeapplication/vnd.oasis.opendocument.spreadsheet')],
    'Line 1',
    /\.ods/u,
  ],
  ['old spreadsheet', [0xd0, 0xcf, 0x11, 0xe0, 0xa1, 0xb1, 0x1a, 0xe1, 0], 'Line 1', /\.xls\)/u],
  ['PDF, though % begins comments', '%PDF-1.7\n0,1,2\n5,2,3\n', 'Line 1', /a PDF document/u],
  ['gzip', [0x1f, 0x8b, 8, 0], 'Line 1', /packed with gzip/u],
  ['HDF5', [0x89, ...ascii('HDF\r\n')], 'Line 1', /an HDF5 file/u],
  ['web page', '<!DOCTYPE html><table><tr><td>0</td></tr></table>', 'Line 1', /a web page/u],
  ['JSON', '{"angle": [0, 1]}', 'Line 1', /a JSON document/u],
];

const ENCODINGS: readonly Hostile[] = [
  ['NUL bytes', [...ascii(HEAD), ...ascii('0,1,2\n5,'), 0, ...ascii('2,3\n')], 'Line 3', /is zero/u],
  ['UTF-16 without its mark', [...encoded(SOUND, 'utf-16le').slice(2)], 'Line 1', /is zero/u],
  ['UTF-16 cut in a character', [...encoded(SOUND, 'utf-16be').slice(0, -1)], 'Line 3', /UTF-16 big-endian/u],
  ['UTF-16 with half a pair', [0xff, 0xfe, 0x00, 0xd8, 0x0a, 0x00], 'Line 1', /UTF-16 little-endian/u],
  ['UTF-32', [0xff, 0xfe, 0, 0, 0x30, 0, 0, 0], 'Line 1', /is zero/u],
  [
    'UTF-8 and Latin-1 mixed',
    [...bytesOf('# µW\nangle ('), 0xb0, ...bytesOf(')\n0,1,2\n1,2,3\n')],
    'Line 2',
    /0xB0/u,
  ],
  [
    'Windows-1252 quotes',
    [0x93, ...ascii('angle'), 0x94, ...ascii(',b,c\n0,1,2\n1,2,3\n')],
    'Line 1',
    /0x93/u,
  ],
  ['a mark of UTF-8 and then Latin-1', [0xef, 0xbb, 0xbf, 0xb0, ...ascii('\n0,1,2\n')], 'Line 1', /0xB0/u],
  ['control character', `${HEAD}0,1,2\n5,2,3\n\u001a`, 'Line 4', /control character \(0x1A\)/u],
];

const NAMELESS: readonly Hostile[] = [
  ['nothing', '', 'Line 1', /is empty/u],
  ['blank lines', ' \n\r\n\t\n', 'Line 1', /is empty/u],
  ['a byte order mark alone', '\ufeff', 'Line 1', /is empty/u],
  ['comments only', '# one\n% two\n// 3, 4, 5\n; six\n', 'Line 4', /comments only/u],
  ['a header only', HEAD, 'Line 1', /No line of this file is a row/u],
  ['prose', 'Measured on Monday.\nNothing came out.\n', 'Line 2', /No line of this file is a row/u],
  ['one row', `${HEAD}0,1,2\n`, 'Line 2', /only one row/u],
  ['one column', '0\n5\n10\n', 'Line 1', /1 column; a scan has at least two/u],
];

const CELLS: readonly Hostile[] = [
  ['nan', `${HEAD}0,1,2\n5,nan,3\n`, 'Line 3, column 2 (crossed)', /“nan” is no measured value/u],
  ['nan in the first row', `${HEAD}0,NaN,2\n5,1,3\n`, 'Line 2, column 2 (crossed)', /“NaN” is no measured/u],
  ['a column of nan', '0,nan,2\n5,nan,3\n', 'Line 1, column 2', /“nan” is no measured value/u],
  [
    'a column of nan beside one power',
    'angle,crossed\n0,nan\n5,nan\n',
    'Line 2, column 2 (crossed)',
    /“nan”/u,
  ],
  ['exponents with D', `${HEAD}0,1,2\n5,2.0D0,3\n`, 'Line 3, column 2 (crossed)', /more than a number/u],
  ['inf', `${HEAD}0,1,-inf\n5,2,3\n`, 'Line 2, column 3 (parallel)', /“-inf” is no measured value/u],
  [
    '#N/A where a comment would begin',
    `${HEAD}0,1,2\n#N/A,2,3\n`,
    'Line 3, column 1 (angle)',
    /spreadsheet’s error/u,
  ],
  ['#DIV/0!', `${HEAD}0,1,2\n5,#DIV/0!,3\n`, 'Line 3, column 2 (crossed)', /spreadsheet’s error/u],
  ['#WERT!', `${HEAD}0,1,2\n5,#WERT!,3\n`, 'Line 3, column 2 (crossed)', /spreadsheet’s error/u],
  ['empty cell', `${HEAD}0,1,2\n5,,3\n`, 'Line 3, column 2 (crossed)', /is empty/u],
  ['cell of blanks', `${HEAD}0,1,2\n5,\u00a0 ,3\n`, 'Line 3, column 2 (crossed)', /is empty/u],
  ['row of delimiters', `${HEAD}0,1,2\n5,2,3\n,,\n`, 'Line 4, column 1 (angle)', /is empty/u],
  ['=1+1', `${HEAD}0,1,2\n5,=1+1,3\n`, 'Line 3, column 2 (crossed)', /formula/u],
  ['+cmd', `${HEAD}0,1,2\n5,+cmd|'/C calc'!A0,3\n`, 'Line 3, column 2 (crossed)', /formula/u],
  ['@SUM', `${HEAD}0,1,2\n@SUM(A1),2,3\n`, 'Line 3, column 1 (angle)', /formula/u],
  ['1+1', `${HEAD}0,1,2\n5,1+1,3\n`, 'Line 3, column 2 (crossed)', /formula/u],
  ['Arabic digits', `${HEAD}0,1,2\n٥,2,3\n`, 'Line 3, column 1 (angle)', /digits other than 0 to 9/u],
  ['full-width digits', `${HEAD}0,1,2\n５,2,3\n`, 'Line 3, column 1 (angle)', /digits other than 0 to 9/u],
  ['hexadecimal', `${HEAD}0,1,2\n0x10,2,3\n`, 'Line 3, column 1 (angle)', /hexadecimal/u],
  ['a unit in the cell', `${HEAD}0,1,2\n5,2 mW,3\n`, 'Line 3, column 2 (crossed)', /more than a number/u],
  ['half an exponent', `${HEAD}0,1,2\n5,2e,3\n`, 'Line 3, column 2 (crossed)', /more than a number/u],
  ['two points', `${HEAD}0,1,2\n5,2.3.4,3\n`, 'Line 3, column 2 (crossed)', /is not a number/u],
  ['out of range above', `${HEAD}0,1,2\n5,1e999,3\n`, 'Line 3, column 2 (crossed)', /too large/u],
  ['out of range below', `${HEAD}0,1,2\n5,1e-999,3\n`, 'Line 3, column 2 (crossed)', /too small/u],
  [
    'out of range in degrees',
    'angle (rad),crossed,parallel\n0,1,2\n1e308,2,3\n',
    'Line 3, column 1 (angle)',
    /out of range/u,
  ],
  [
    'a negative σ',
    'angle (deg),crossed,err crossed,parallel\n0,1,.1,2\n5,1,-.1,2\n',
    'Line 3, column 3 (err crossed)',
    /σ is negative/u,
  ],
  ['a text among rows', `${HEAD}0,1,2\nend of run,2,3\n`, 'Line 3, column 1 (angle)', /is not a number/u],
];

const SHAPES: readonly Hostile[] = [
  ['one port cut before its power', 'angle,crossed\n0,1\n5,2\n10', 'Line 4', /1 column, the others have 2/u],
  ['cut in a row', `${HEAD}0,1,2\n5,2`, 'Line 3', /was cut off here/u],
  ['cut before the last cell', `${HEAD}0,1,2\n5,2,`, 'Line 3, column 3 (parallel)', /is empty/u],
  ['a short row', `${HEAD}0,1,2\n5,2\n10,2,3\n`, 'Line 3', /2 columns, the others have 3/u],
  ['a long row', `${HEAD}0,1,2\n5,2,3,4\n10,2,3\n`, 'Line 3', /4 columns, the others have 3/u],
  ['a footer', `${HEAD}0,1,2\n5,2,3\nend of run\n`, 'Line 4', /Begin the line with #/u],
  ['open quote', `${HEAD}0,1,2\n"5,2,3\n6,2,3\n`, 'Line 3', /quote is not closed/u],
  ['open quote on the last line', `${HEAD}0,1,2\n5,"2,3`, 'Line 3', /may have been cut off/u],
  ['text behind a quote', `${HEAD}0,1,2\n"5"x,2,3\n6,2,3\n`, 'Line 3', /text stands behind one/u],
  ['too few names', 'angle,crossed\n0,1,2\n5,2,3\n', 'Line 1', /names 2 columns, and the rows have 3/u],
  [
    'decimal commas between commas',
    `${HEAD}0,5,1,5,2,5\n1,5,1,5,2,5\n`,
    'Line 1',
    /names 3 columns, and the rows have 6/u,
  ],
  [
    'decimal commas here and there',
    `${HEAD}0,1,5,2\n5,2,3\n6,1,3\n`,
    'Line 2',
    /4 columns, the others have 3/u,
  ],
  [
    'a line of 5 kB',
    `${HEAD}0,1,2\n5,2,${'3'.repeat(5000)}\n`,
    'Line 3',
    /5004 characters; the most is 4096/u,
  ],
  ['65 columns', `${'1,'.repeat(64)}1\n${'2,'.repeat(64)}2\n`, 'Line 1', /65 columns; the most is 64/u],
];

const THOUSANDS: readonly Hostile[] = [
  [
    '1,234.5',
    'angle;crossed;parallel\n0;1,234.5;2.5\n5;2.5;3.5\n',
    'Line 2, column 2 (crossed)',
    /thousands/u,
  ],
  [
    '1.234,5',
    'angle;crossed;parallel\n0;1.234,5;2,5\n5;2,5;3,5\n',
    'Line 2, column 2 (crossed)',
    /thousands/u,
  ],
  ['1 234', 'angle;crossed;parallel\n0;1 234;2\n5;2;3\n', 'Line 2, column 2 (crossed)', /thousands/u],
  [
    '1 234 between tabs',
    'angle\tcrossed\tparallel\n0\t1 234\t1 001\n5\t1 100\t1 000\n',
    'Line 2, column 2 (crossed)',
    /thousands/u,
  ],
  [
    'no-break space',
    'angle;crossed;parallel\n0;1\u00a0234;2\n5;2;3\n',
    'Line 2, column 2 (crossed)',
    /thousands/u,
  ],
  ['apostrophe', "angle;crossed;parallel\n0;1'234;2\n5;2;3\n", 'Line 2, column 2 (crossed)', /thousands/u],
  ['1,234,567', 'angle;crossed;parallel\n0;1,234,567;2\n5;2;3\n', 'Line 2, column 2 (crossed)', /thousands/u],
  [
    'each comma with three digits',
    'angle;crossed;parallel\n0;1,234;2,345\n5;2,345;3,456\n',
    'Line 2, column 2 (crossed)',
    /may be a decimal sign/u,
  ],
  [
    'points with three digits beside small whole numbers',
    'angle;crossed;parallel\n0;1.234;2\n5;999;3\n',
    'Line 2, column 2 (crossed)',
    /may be a decimal sign/u,
  ],
  ['commas and blanks in two ways', '0,1 234,2 345\n5,1 300,2 400\n', 'Line 1', /read in two ways/u],
  [
    'both decimal signs',
    'angle;crossed;parallel\n0,5;1,5;2,5\n5,5;2.5;3,5\n',
    'Line 3, column 2 (crossed)',
    /“2.5” has a point, while/u,
  ],
];

const ALL = [...OTHER_FILES, ...ENCODINGS, ...NAMELESS, ...CELLS, ...SHAPES, ...THOUSANDS];

test.each(ALL)('%s is refused by name and place', (_, content, place, words) => {
  const { faults, moreFaults } = faultsOf(bytesOf(content));
  const [first] = faults;
  if (first === undefined) throw new Error('There is no fault.');
  expect(describeFault(first).startsWith(`${place}: `)).toBe(true);
  expect(describeFault(first)).toMatch(words);
  expect(first.remedy).toMatch(/\.$/u);
  expect(moreFaults).toBe(0);
});

test('sixty files and more are held against it', () => {
  expect(ALL.length).toBeGreaterThanOrEqual(60);
});
