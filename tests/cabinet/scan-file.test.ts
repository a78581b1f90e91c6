import { describe, expect, test } from 'vitest';
import {
  type ColumnMapping,
  readScanFile,
  type ScanQuestions,
  type ScanReading,
  type ScanTable,
} from '../../shared/scan-file';
import { encoded } from './scan-file-writer';

function read(text: string, mapping: ColumnMapping | null = null): ScanReading {
  return readScanFile(encoded(text, 'utf-8'), mapping);
}

function tableOf(text: string, mapping: ColumnMapping | null = null): ScanTable {
  const reading = read(text, mapping);
  if (reading.kind !== 'table') throw new Error(`This is no table: ${JSON.stringify(reading)}`);
  return reading;
}

function questionsOf(text: string, mapping: ColumnMapping | null = null): ScanQuestions {
  const reading = read(text, mapping);
  if (reading.kind !== 'asks') throw new Error(`Nothing is asked: ${JSON.stringify(reading)}`);
  return reading;
}

/** "dial crossed parallel", with the σ where there are some. */
function rowsOf({ points }: ScanTable): string[] {
  return points.map(({ dialDeg, crossed, parallel, crossedSigma, parallelSigma }) =>
    [dialDeg, crossed, parallel, crossedSigma, parallelSigma].filter((value) => value !== null).join(' '),
  );
}

const chosen = (dial: number, crossed: number, parallel: number): ColumnMapping => ({
  dial: { column: dial, unit: null },
  crossed: { column: crossed, unit: null },
  parallel: { column: parallel, unit: null },
  crossedSigma: null,
  parallelSigma: null,
});

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

describe('units', () => {
  test.each([
    ['angle (deg)', 30],
    ['dial [°]', 30],
    ['angle°', 30],
    ['angle_deg', 30],
    ['angleDeg', 30],
    ['Winkel in Grad [deg]', 30],
    ['theta, degrees', 30],
    ['Angle/rad', 1718.8733853924696],
    ['ANGLE (RAD)', 1718.8733853924696],
    ['rotation mrad', 1.7188733853924696],
    ['position (arcmin)', 0.5],
  ])('“%s” reads 30 as %d°', (name, dialDeg) => {
    const table = tableOf(`"${name}",crossed,parallel\n30,1,2\n60,2,3\n`);
    // 30 rad and 30 mrad in degrees from bc with 40 digits.
    expect(table.points[0]?.dialDeg).toBe(dialDeg);
    expect(table.notes).toEqual([]);
  });

  test.each([
    ['P_cross (µW)', 'P_par (mW)', 'uW', '0 1 2000'],
    ['crossed mW', 'parallel µW', 'mW', '0 1 0.002'],
    ['crossed/nW', 'parallel/nW', 'nW', '0 1 2'],
    ['crossed_mV', 'parallel [V]', 'mV', '0 1 2000'],
    ['I_cross (nA)', 'I_par (pA)', 'nA', '0 1 0.002'],
    ['crossed counts/s', 'parallel [counts/s]', 'counts/s', '0 1 2'],
    ['crossed (counts)', 'parallel (counts)', 'counts', '0 1 2'],
    ['crossed (a.u.)', 'parallel (arb. units)', 'arbitrary', '0 1 2'],
    ['crossed', 'parallel', 'arbitrary', '0 1 2'],
    ['crossed_V', 'parallel_V', 'arbitrary', '0 1 2'],
  ])('“%s” and “%s” are kept in %s', (crossed, parallel, unit, first) => {
    const table = tableOf(`dial (deg),${crossed},${parallel}\n0,1,2\n5,2,3\n`);
    expect(table.powerUnit).toBe(unit);
    expect(rowsOf(table)[0]).toBe(first);
    expect(table.notes).toEqual([]);
  });

  test('σ are converted with their powers', () => {
    const table = tableOf(
      'dial (deg),crossed (mW),crossed σ (µW),parallel (µW),parallel std (mW)\n0,1,2,3,4\n5,1,2,3,4\n',
    );
    expect(rowsOf(table)[0]).toBe('0 1 0.003 0.002 4');
  });

  test('an angle without a unit is in degrees, and the note says so', () => {
    const { notes } = tableOf('dial,crossed,parallel\n0,1,2\n50,2,3\n');
    expect(notes).toEqual(['The dial, column 1 (“dial”), names no unit and is read in degrees.']);
  });

  test('a dial without a unit that stays below 2π is asked about in a note', () => {
    expect(tableOf('dial,crossed,parallel\n0,1,2\n6.2832,2,3\n').notes[1]).toMatch(/Are these radians\?/u);
    expect(tableOf('dial (deg),crossed,parallel\n0,1,2\n6.2832,2,3\n').notes).toEqual([]);
  });

  test('a power without a unit is in the other’s, and the note says so', () => {
    const { notes, powerUnit } = tableOf('dial (deg),crossed,parallel (mW)\n0,1,2\n5,2,3\n');
    expect(powerUnit).toBe('mW');
    expect(notes).toEqual(['Column 2 (“crossed”) names no unit and is read in mW, as the other power is.']);
  });

  test('one unknown unit for both powers is kept with a note', () => {
    const { notes, powerUnit } = tableOf('dial (deg),crossed [LSB],parallel [LSB]\n0,1,2\n5,2,3\n');
    expect(powerUnit).toBe('arbitrary');
    expect(notes).toEqual(['Both powers are in “LSB”, a unit that is not known; they are kept as they are.']);
  });

  test.each([
    ['dial (gon),crossed,parallel', /In which unit is the dial.*“gon”/u],
    ['dial (deg),crossed (dBm),parallel (mW)', /“dBm”, which is logarithmic/u],
    ['dial (deg),crossed (mW),parallel (V)', /Crossed is in mW and parallel in V/u],
    ['dial (deg),crossed (counts),parallel (counts/s)', /can’t be compared/u],
    ['dial (deg),crossed [LSB],parallel [div]', /“LSB” and “div”/u],
    ['dial (deg),crossed [LSB],parallel (mW)', /“LSB” for one of them/u],
    ['dial (deg),crossed (deg),parallel (mW)', /which is an angle’s/u],
  ])('“%s” is asked about', (header, words) => {
    const { questions } = questionsOf(`${header}\n0,1,2\n5,2,3\n`);
    expect(questions).toHaveLength(1);
    expect(questions[0]).toMatch(words);
  });

  test('a σ in per cent is asked about', () => {
    const { questions } = questionsOf(
      'dial (deg),crossed (mW),crossed err (%),parallel (mW)\n0,1,2,3\n5,1,2,3\n',
    );
    expect(questions).toEqual([
      'In which unit is column 3 (“crossed err”)? A σ is read in the unit of its power, mW, and not as a share of it.',
    ]);
  });
});

describe('which column is what', () => {
  test.each([
    ['angle,crossed,parallel', [0, 1, 2, null, null]],
    ['theta,P_perp,P_par', [0, 1, 2, null, null]],
    ['parallel,⊥,position', [2, 1, 0, null, null]],
    ['power (crossed),power (parallel),stage rotation', [2, 0, 1, null, null]],
    ['dial,transmission crossed,transmission parallel', [0, 1, 2, null, null]],
    ['dial,reflected,transmitted', [0, 1, 2, null, null]],
    ['dial,min,max', [0, 1, 2, null, null]],
    ['dial,P∥,P⊥', [0, 2, 1, null, null]],
    ['dial,I_{||},I_{⊥}', [0, 2, 1, null, null]],
    ['crossedPower,parallelPower,dialAngle', [2, 0, 1, null, null]],
    ['dial,crossed,std crossed,parallel,std parallel', [0, 1, 3, 2, 4]],
    ['dial,crossed,parallel,σ ∥,± crossed', [0, 1, 2, 4, 3]],
    ['dial,crossed,err,parallel,err', [0, 1, 3, 2, 4]],
    ['dial,crossed,parallel,temperature,crossed/parallel ratio', [0, 1, 2, null, null]],
    ['dial,crossed,parallel,angle err,time', [0, 1, 2, null, null]],
  ])('“%s”', (header, [dial, crossed, parallel, crossedSigma, parallelSigma]) => {
    const width = header.split(',').length;
    const rows = [0, 1].map((row) => Array.from({ length: width }, (_, at) => row + at).join(','));
    const { proposal } = tableOf(`${header}\n${rows.join('\n')}\n`);
    expect(proposal.columns).toEqual({ dial, crossed, parallel, crossedSigma, parallelSigma });
    expect(proposal.confidence).toBe(header.includes(',err,') ? 'likely' : 'sure');
  });

  test('columns that are not used are named, and text in them does no harm', () => {
    const { notes } = tableOf('time,dial (deg),crossed,parallel,room\n12:01,0,1,2,nan\n12:02,5,2,3,21\n');
    expect(notes).toEqual(['Not used: column 1 (“time”), column 5 (“room”).']);
  });

  test('without a header the evenest column is proposed as the dial, and the powers are asked about', () => {
    const { proposal, questions } = questionsOf('3,0,1\n1,5,2\n4,10,2\n1,15,7\n');
    expect(proposal.columns).toMatchObject({ dial: 1, crossed: null, parallel: null });
    expect(proposal.confidence).toBe('unclear');
    expect(proposal.reason).toBe(
      'The file has no header. The dial is column 2, since it alone goes in even steps.',
    );
    expect(questions).toEqual([
      'Which column is the power between crossed polarisers? No name says so, and numbers alone can’t.',
      'Which column is the power between parallel polarisers? No name says so, and numbers alone can’t.',
    ]);
  });

  test('two columns that go as evenly leave the dial open', () => {
    const { proposal } = questionsOf('1,0,3,4\n2,5,1,9\n3,10,4,2\n4,15,1,7\n');
    expect(proposal.columns.dial).toBe(null);
  });

  test('a dial that no name tells is found by its steps', () => {
    const { proposal, points } = tableOf('crossed,parallel,x\n3,2,0\n1,3,5\n4,1,10\n1,5,15\n');
    expect(proposal.columns.dial).toBe(2);
    expect(proposal.confidence).toBe('likely');
    expect(points[1]).toMatchObject({ dialDeg: 5, crossed: 1, parallel: 3 });
  });

  test('a header in another order than the columns is asked about', () => {
    const { questions, proposal } = questionsOf('dial,crossed,parallel\n3,0,2\n1,5,3\n4,10,1\n1,15,5\n');
    expect(questions[0]).toMatch(/^Is the header in the columns’ order\?/u);
    expect(proposal.confidence).toBe('unclear');
  });

  test.each([
    [
      'two columns of one name',
      'dial,crossed,crossed,parallel',
      /Which column is the power between crossed/u,
    ],
    ['one σ for two powers', 'dial,crossed,parallel,sigma', /Whose σ is column 4/u],
    ['two dials', 'dial,angle,crossed,parallel', /Which column is the dial’s reading\? By their names/u],
  ])('%s are asked about', (_, header, words) => {
    expect(questionsOf(`${header}\n0,1,2,3\n5,1,2,3\n`).questions[0]).toMatch(words);
  });

  test('a mapping from outside decides, with its units', () => {
    const mapping: ColumnMapping = {
      dial: { column: 1, unit: 'arcmin' },
      crossed: { column: 2, unit: 'mW' },
      parallel: { column: 0, unit: 'uW' },
      crossedSigma: { column: 3, unit: null },
      parallelSigma: null,
    };
    const table = tableOf('3,0,1,7\n1,30,2,8\n', mapping);
    expect(rowsOf(table)).toEqual(['0 1 0.003 7', '0.5 2 0.001 8']);
    expect(table.mapping.crossedSigma).toEqual({ column: 3, unit: 'mW' });
  });

  test('a mapping that says other than the header is followed with a note', () => {
    const table = tableOf('dial (deg),crossed,parallel\n0,1,2\n5,2,3\n', chosen(0, 2, 1));
    expect(rowsOf(table)[0]).toBe('0 2 1');
    expect(table.notes).toEqual([
      '“parallel” is read as crossed, as the mapping says.',
      '“crossed” is read as parallel, as the mapping says.',
    ]);
  });

  test.each([
    ['a column that is not there', chosen(0, 1, 3), /names column 4, and the file has 3/u],
    ['a column before the first', chosen(-1, 1, 2), /names column 0/u],
    ['half a column', chosen(0.5, 1, 2), /names column 1\.5/u],
    ['one column twice', chosen(0, 1, 1), /names column 2 for two things/u],
  ])('a mapping with %s is refused', (_, mapping, words) => {
    const reading = read('dial,crossed,parallel\n0,1,2\n5,2,3\n', mapping);
    expect(reading.kind === 'faults' && reading.faults[0]?.what).toMatch(words);
  });

  test('a mapping onto a column of text is refused cell by cell', () => {
    const reading = read('dial,crossed,parallel,room\n0,1,2,a\n5,2,3,b\n', chosen(0, 1, 3));
    expect(reading.kind === 'faults' && reading.faults.map(({ line }) => line)).toEqual([2, 3]);
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
