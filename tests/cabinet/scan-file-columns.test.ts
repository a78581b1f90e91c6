import { describe, expect, test } from 'vitest';
import type { ColumnMapping } from '../../shared/scan-file';
import { chosen, questionsOf, read, rowsOf, tableOf } from './scan-file-readings';

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
    ['no power', chosen(0, null, null), /names neither the crossed nor the parallel power/u],
    [
      'a σ of a power that it doesn’t name',
      { ...chosen(0, 1, null), parallelSigma: { column: 2, unit: null } },
      /a σ of the parallel power, and no parallel power/u,
    ],
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

describe('files of one port', () => {
  test.each([
    ['dial (deg),crossed (mW)\n0,1\n5,2\n', { crossed: 1, parallel: null }, 'mW'],
    ['dial (deg);P_par (µW)\n0;1,5\n5;2,5\n', { crossed: null, parallel: 1 }, 'uW'],
    ['dial (deg),crossed (mW),room\n0,1,2\n5,2,3\n', { crossed: 1, parallel: null }, 'mW'],
    ['dial (deg)\tI_⊥\n0\t1\n5\t2\n', { crossed: 1, parallel: null }, 'arbitrary'],
  ])('a header that names one port asks nothing about the other: %j', (text, ports, unit) => {
    const table = tableOf(text);
    expect(table.proposal.confidence).toBe('sure');
    expect(table.proposal.columns).toMatchObject({ dial: 0, ...ports });
    expect(table.powerUnit).toBe(unit);
    const [point] = table.points;
    expect([point?.crossed === null, point?.parallel === null]).toEqual([
      ports.crossed === null,
      ports.parallel === null,
    ]);
  });

  test.each([
    ['angle (deg),power (mW)\n0,1\n5,2\n', 'column 2 (“power”)'],
    ['angle (deg),power (mW),err (mW)\n0,1,2\n5,2,3\n', 'column 2 (“power”)'],
    ['3;0\n1;5\n4;10\n1;15\n', 'column 1'],
  ])('the port of one power that no word names is asked for: %j', (text, label) => {
    expect(questionsOf(text).questions[0]).toBe(
      `Is ${label} the power between crossed or between parallel polarisers? No name says so, and numbers alone can’t.`,
    );
  });

  test('a mapping answers which port it is', () => {
    const text = 'angle (deg),power (mW)\n0,1\n5,2\n';
    expect(rowsOf(tableOf(text, chosen(0, 1, null)))).toEqual(['0 1', '5 2']);
    expect(tableOf(text, chosen(0, null, 1)).points[1]).toMatchObject({ crossed: null, parallel: 2 });
  });

  test('σ on the right of the one power is its own', () => {
    const table = tableOf('dial (deg),parallel (mW),err\n0,1,0.1\n5,2,0.2\n');
    expect(table.points[1]).toMatchObject({ parallel: 2, parallelSigma: 0.2, crossedSigma: null });
    expect(table.proposal.reason).toMatch(/The column of σ belongs to the power on its left/u);
  });

  test('a unit that nobody knows is kept with a note', () => {
    const { notes, powerUnit } = tableOf('dial (deg),crossed [LSB]\n0,1\n5,2\n');
    expect(powerUnit).toBe('arbitrary');
    expect(notes).toEqual(['The power is in “LSB”, a unit that is not known; it is kept as it is.']);
  });

  test('no power at all is asked about', () => {
    expect(questionsOf('dial (deg),x,y\n0,1,3\n5,2,4\n').questions).toHaveLength(2);
  });
});
