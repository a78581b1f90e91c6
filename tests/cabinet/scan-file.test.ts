import { describe, expect, test } from 'vitest';
import { readScanFile } from '../../shared/scan-file';
import { rowsOf, tableOf } from './scan-file-readings';
import { encoded } from './scan-file-writer';

const TWO = ['0 0.5 1.5', '5 2 -300'];

describe('dialects that mean the same', () => {
  test.each([
    ['comma', 'dial (deg),crossed,parallel\n0,0.5,1.5\n5,2,-3e2\n'],
    ['comma and blanks', 'dial (deg), crossed, parallel\n 0, 0.5, 1.5\n 5, 2, -3e2\n'],
    ['quoted decimal commas between commas', 'dial (deg),crossed,parallel\n0,"0,5","1,5"\n5,2,"-3,0e2"\n'],
    ['semicolon, decimal comma', 'dial (deg);crossed;parallel\n0;0,5;1,5\n5;2;-300\n'],
    ['tab', 'dial (deg)\tcrossed\tparallel\n0\t0.5\t1.5\n5\t2\t-300\n'],
    [
      'aligned',
      '  dial (deg)  crossed   parallel\n       0       0.5       1.5\n       5       2.0    -300.0\n',
    ],
    ['aligned, decimal comma', 'dial (deg)  crossed  parallel\n0  0,5  1,5\n5  2  -300\n'],
    ['aligned with tabs here and there', 'dial (deg)  crossed  parallel\n0 0.5\t1.5\n5 2 -300\n'],
    [
      'drawn with pipes',
      '| dial (deg) | crossed | parallel |\n|---|---|---|\n| 0 | 0.5 | 1.5 |\n| 5 | 2 | -300 |\n',
    ],
    ['pipes between the columns', 'dial (deg)|crossed|parallel\n0|0.5|1.5\n5|2|-300\n'],
    ['delimiters at the ends of lines', 'dial (deg),crossed,parallel\n0,0.5,1.5,\n5,2,-300,\n'],
    ['no digit before the point, none behind', 'dial (deg),crossed,parallel\n0.,.5,1.5\n+5,2.,-300\n'],
    ['U+2212 and no-break spaces', 'dial (deg);crossed;parallel\n\u00a00;0.5;1.5\n5;2\u00a0;\u2212300\n'],
    ['all quoted', '"dial (deg)","crossed","parallel"\n"0","0.5","1.5"\n"5","2","-300"\n'],
    ['old line ends', 'dial (deg),crossed,parallel\r0,0.5,1.5\r5,2,-300\r'],
    ['a header that is a comment', '# made by hand\n# dial [deg] crossed parallel\n0 0.5 1.5\n5 2 -300\n'],
    ['a quoted comment', '"# lamp on, warm",,\ndial (deg),crossed,parallel\n0,0.5,1.5\n5,2,-300\n'],
    [
      'comments with every sign',
      '# a\n% b\n// c\n; d, 4\ndial (deg),crossed,parallel\n0,0.5,1.5\n# 3,4,5\n5,2,-300\n',
    ],
    [
      'text above the header',
      'Laser: HeNe, 633 nm\nDate,2031-01-02\n\ndial (deg),crossed,parallel\n0,0.5,1.5\n5,2,-300\n',
    ],
    ['units on a line of their own', 'dial,crossed,parallel\ndeg,mW,mW\n0,0.5,1.5\n5,2,-300\n'],
    ['blank lines', '\n\ndial (deg),crossed,parallel\n\n0,0.5,1.5\n \n5,2,-300\n\n'],
  ])('%s', (_, text) => {
    const table = tableOf(text);
    expect(rowsOf(table)).toEqual(TWO);
    expect(table.notes).toEqual([]);
  });

  test.each([
    ['UTF-8', 'utf-8'],
    ['UTF-8 with a byte order mark', 'utf-8 bom'],
    ['UTF-16 little-endian', 'utf-16le'],
    ['UTF-16 big-endian', 'utf-16be'],
    ['Latin-1', 'latin-1'],
  ] as const)('%s', (name, encoding) => {
    const reading = readScanFile(
      encoded('dial [°];crossed [µW];parallel [µW]\n0;0.5;1.5\n5;2;-300\n', encoding),
    );
    if (reading.kind !== 'table') throw new Error(JSON.stringify(reading));
    expect(rowsOf(reading)).toEqual(TWO);
    expect(reading.powerUnit).toBe('uW');
    expect(reading.preview.encoding).toBe(name);
    const said = name === 'Latin-1' ? ['The file is not UTF-8 and is read as Latin-1.'] : [];
    expect(reading.notes).toEqual(said);
  });

  test('each point knows its line', () => {
    const { points } = tableOf('# a\r\n\r\ndial (deg),crossed,parallel\r\n0,1,2\r\n# b\r\n5,2,3\r\n');
    expect(points.map(({ line }) => line)).toEqual([4, 6]);
  });

  test('a dial may stand twice at one angle', () => {
    expect(tableOf('dial (deg),crossed,parallel\n0,1,2\n0,1,2\n5,1,2\n').points).toHaveLength(3);
  });
});

describe('what is shown and kept', () => {
  test('the preview has eight rows as they are written, and the facts', () => {
    const rows = Array.from({ length: 20 }, (_, at) => `${at};${at},50;1`);
    const { preview } = tableOf(
      `# one\nby hand\ndial (°);crossed (mW);parallel\n# two\n${rows.join('\n')}\n`,
    );
    expect(preview).toMatchObject({
      encoding: 'UTF-8',
      delimiter: 'semicolon',
      decimalSign: 'comma',
      commentLineCount: 3,
      headerLine: 3,
      rowCount: 20,
      columns: [
        { number: 1, name: 'dial', unit: '°' },
        { number: 2, name: 'crossed', unit: 'mW' },
        { number: 3, name: 'parallel', unit: null },
      ],
    });
    expect(preview.rows).toHaveLength(8);
    expect(preview.rows[1]).toEqual({ line: 6, cells: ['1', '1,50', '1'] });
  });

  test('files that look alike have one signature, and others have others', () => {
    const signature = (text: string): string => tableOf(text).signature;
    const one = signature('Dial (deg),Crossed (µW),Parallel\n0,1,2\n5,2,3\n');
    expect(signature('# today\n"dial  (deg)",crossed (μW) , parallel\n7,1,2\n9,2,3\n8,1,1\n')).toBe(one);
    const others = [
      'Dial (deg);Crossed (µW);Parallel\n0;1;2\n5;2;3\n',
      'Dial (rad),Crossed (µW),Parallel\n0,1,2\n5,2,3\n',
      'Dial (deg),Crossed (µW),Parallel,x\n0,1,2,3\n5,2,3,4\n',
      'Dial (deg),Parallel,Crossed (µW)\n0,1,2\n5,2,3\n',
    ];
    expect(new Set([one, ...others.map(signature)]).size).toBe(5);
  });

  test('a last line without a line break is read, and the note says what can’t be known', () => {
    const table = tableOf('dial (deg),crossed,parallel\n0,1,2\n5,2,3');
    expect(rowsOf(table)).toEqual(['0 1 2', '5 2 3']);
    expect(table.notes).toEqual([
      'The last line, 3, has no line break behind it. If the file was cut off there, its last number is too short.',
    ]);
    expect(tableOf('dial (deg),crossed,parallel\n0,1,2\n5,2,3\n# end').notes).toEqual([]);
  });
});
