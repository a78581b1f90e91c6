import { describe, expect, it } from 'vitest';
import {
  type CabinetDocument,
  type FileFault,
  maxDocumentBytes,
  maxDocumentRows,
  maxFaults,
  readCabinet,
  writeCabinet,
} from '../../shared/cabinet-document';
import { cabinet, calibration, day, mount, plate, seat } from './document-fixture';

const NOW = new Date(day(60));

function faultsOf(text: string, format: 'csv' | 'json' = 'csv'): readonly FileFault[] {
  const reading = readCabinet(text, format, NOW);
  return reading.ok ? [] : reading.faults;
}

/** Row, column and a part of the sentence of the first fault. */
function expectFault(text: string, row: number | null, column: string | null, words: string): void {
  const [fault] = faultsOf(text);
  expect([fault?.row, fault?.column]).toEqual([row, column]);
  expect(fault?.message).toContain(words);
}

const good = cabinet(
  [mount('M-1'), mount('M-2')],
  [
    plate('H-1', [
      seat('M-1', 1, 9, [calibration(2)]),
      seat('M-1', 9, null, [calibration(10), calibration(11)]),
    ]),
  ],
);
const csv = (document: CabinetDocument = good): string => writeCabinet(document, 'csv');
const lines = csv().trimEnd().split('\r\n');
/** The text with some cells changed: rows as a spreadsheet counts, columns by name. */
function withCells(changes: readonly (readonly [row: number, column: string, cell: string])[]): string {
  const header = (lines[0] ?? '').split(',');
  const cells = lines.map((line) => line.split(','));
  for (const [row, column, cell] of changes) {
    const place = header.indexOf(column);
    expect(place).toBeGreaterThanOrEqual(0);
    cells[row - 1] = (cells[row - 1] ?? []).with(place, cell);
  }
  return cells.map((row) => row.join(',')).join('\r\n');
}

const withCell = (row: number, column: string, cell: string): string => withCells([[row, column, cell]]);

it('a file of these tests is well as it stands', () => {
  expect(faultsOf(csv())).toEqual([]);
  expect(lines).toHaveLength(5);
});

it('a plate without an order is of order zero', () => {
  const empty = withCells([2, 3, 4].map((row) => [row, 'order_waves', ''] as const));
  expect(readCabinet(empty, 'csv', NOW)).toEqual(readCabinet(csv(), 'csv', NOW));
});

describe('a cell at fault is named by row and column', () => {
  it.each([
    ['retardance_deg', 'NaN', 'no number'],
    ['retardance_deg', 'Infinity', 'no number'],
    ['retardance_deg', '', 'A retardance is a number, like 180.4.'],
    ['retardance_deg', '361', 'A retardance is from 0.1 to 359.9°.'],
    ['wavelength_nm', '"810,5"', 'decimal point'],
    ['wavelength_nm', '810 nm', 'no unit'],
    ['method', '=HYPERLINK("x")'.replaceAll('"', ''), 'begins like a formula'],
    ['method', '"@SUM(A1:A9)"', 'begins like a formula'],
    ['calibration_note', '-5 V', 'begins like a formula'],
    ['method', '', 'Write the way it was measured.'],
    ['method', 'a\u0007b', 'cannot be printed'],
    ['open_questions', 'axis fast', 'axis, branch, blind'],
    ['open_questions', 'axis axis', 'once'],
    ['settles_number', '7', 'No calibration of this plate has the number 7'],
    ['settles_number', '2', 'left nothing open'],
    ['measured_at', '2026-03-10', 'a day and a time like'],
    ['measured_at', day(90), 'in the future'],
    ['measured_at', day(1), 'before the seat in'],
    ['measured_at', '1850-01-01T00:00:00Z', 'before 1900'],
    ['calibration_number', '1', 'Row 2 has this number already'],
    ['recorded_by', '', 'Write the name of who recorded it.'],
  ])('%s: %s', (column, cell, words) => {
    expectFault(withCell(3, column, cell), 3, column, words);
  });

  it('beside every other, in its own row and in others', () => {
    const text = withCells([
      [2, 'retardance_deg', '361'],
      [3, 'retardance_deg', 'NaN'],
      [3, 'method', '=1'],
      [4, 'method', ''],
      [5, 'drive', 'hand,'],
    ]);
    expect(faultsOf(text).map(({ row, column }) => [row, column])).toEqual([
      [2, 'retardance_deg'],
      [3, 'retardance_deg'],
      [3, 'method'],
      [4, 'method'],
      [5, null],
    ]);
  });

  it('without holding rows against each other whose names cannot be read', () => {
    const two = cabinet(
      [mount('M-1'), mount('M-2')],
      [
        plate('H-1', [seat('M-1', 1, null)]),
        plate('H-2', [seat('M-2', 1, null)], { designWavelengthNm: 1550 }),
      ],
    );
    const text = csv(two).replace('H-1,', '+45,').replace('H-2,', '-45,');
    expect(faultsOf(text).map(({ row, column }) => [row, column])).toEqual([
      [2, 'plate'],
      [3, 'plate'],
    ]);
  });

  it('with both rows where what is repeated disagrees', () => {
    expectFault(
      withCell(3, 'design_wavelength_nm', '808'),
      3,
      'design_wavelength_nm',
      'Row 3 says 808 and row 2 says 810',
    );
    expectFault(
      withCell(4, 'left_why', 'Knocked.'),
      4,
      'left_why',
      'Row 4 says Knocked. and row 3 says nothing',
    );
    expectFault(withCell(3, 'resolution_deg', '0.2'), 3, 'resolution_deg', 'of one mount');
  });

  it('where a plate or a mount is described as none is', () => {
    expectFault(withCell(5, 'direction', 'ccw'), 5, 'direction', 'Write 1 where its numbers rise');
    expectFault(withCell(5, 'direction', '0'), 5, 'direction', 'Write one of these: 1, -1.');
    expectFault(withCell(5, 'range_from_deg', '0'), 5, 'range_to_deg', 'The last reading is a number');
    expectFault(withCell(5, 'drive', 'hands'), 5, 'drive', 'Write one of these: hand, motor.');
    expectFault(withCell(5, 'mount', ''), 5, 'mount', 'Write the mount');
    expectFault(withCell(5, 'seated_at', day(1)), 5, 'plate', 'names no plate');
  });
});

describe('what no cell shows by itself is found', () => {
  it.each([
    [
      'two seats of a plate at one time',
      cabinet([mount('M-1'), mount('M-2')], [plate('H-1', [seat('M-1', 1, 9), seat('M-2', 8, null)])]),
      [3, 'seated_at', 'H-1 sits in two mounts at one time'],
    ],
    [
      'two plates in one mount at one time',
      cabinet([mount('M-1')], [plate('H-1', [seat('M-1', 1, null)]), plate('H-2', [seat('M-1', 8, null)])]),
      [3, 'seated_at', 'M-1 holds two plates at one time'],
    ],
    [
      'a name twice, but for its capitals',
      cabinet([], [plate('H-1'), plate('h-1')]),
      [3, 'plate', 'two plates called h-1'],
    ],
    ['two mounts of one name', cabinet([mount('M-1'), mount('m-1')]), [3, 'mount', 'two mounts called m-1']],
    [
      'a measurement after its seat ended',
      cabinet([mount('M-1')], [plate('H-1', [seat('M-1', 1, 9, [calibration(12)])])]),
      [2, 'measured_at', 'after the seat in M-1 ended'],
    ],
    [
      'a plate in a mount that is retired',
      cabinet([mount('M-1', { retiredAt: day(5) })], [plate('H-1', [seat('M-1', 1, null, [], day(5))])]),
      [2, 'left_at', 'M-1 is retired'],
    ],
    [
      'a seat that ends before it begins',
      cabinet([mount('M-1')], [plate('H-1', [seat('M-1', 9, 1)])]),
      [2, 'left_at', 'ends before it begins'],
    ],
    [
      'calibrations that settle each other',
      cabinet(
        [mount('M-1')],
        [
          plate('H-1', [
            seat('M-1', 1, null, [
              calibration(2, { openQuestions: ['axis'], settles: 2 }),
              calibration(3, { openQuestions: ['axis'], settles: 1 }),
            ]),
          ]),
        ],
      ),
      [2, 'settles_number', 'in a circle'],
    ],
  ] as const)('%s', (_what, document, [row, column, words]) => {
    expectFault(csv(document), row, column, words);
  });

  it('but a plate may leave a mount in the moment in which another comes, and a retired one may have its name', () => {
    const document = cabinet(
      [mount('M-1')],
      [plate('H-1', [seat('M-1', 1, 9)], { retiredAt: day(10) }), plate('H-1', [seat('M-1', 9, null)])],
    );
    expect(faultsOf(csv(document))).toEqual([]);
  });

  it('and a first seat begins before its plate was measured in it, like a later one', () => {
    const early = csv(cabinet([mount('M-1')], [plate('H-1', [seat('M-1', 9, null, [calibration(2)])])]));
    expectFault(early, 2, 'measured_at', 'before the seat in M-1 began');
  });
});

describe('a file that is no cabinet is refused with its row and reason', () => {
  it.each([
    ['an empty file', '', null, null, 'empty'],
    ['another table', 'angle,power\n0,1\n', 1, 'angle', 'not one of a cabinet'],
    ['a header with a column less', csv().replace('retardance_deg,', ''), 1, 'retardance_deg', 'missing'],
    ['a header with one twice', csv().replace('serial,', 'material,'), 1, 'material', 'twice'],
    ['binary', `${csv()}\u0000\u0001`, 6, null, 'null character'],
    ['a row cut off', csv().slice(0, -30), 5, null, 'cells'],
    ['a row cut off in a quote', `${csv()}"H-9,x`, 6, null, 'never closed'],
    ['a quote in a plain cell', csv().replace('hand', 'ha"nd'), 2, null, 'quote'],
    ['text behind a quote', csv().replace('hand', '"ha"nd'), 2, null, 'closing quote'],
    [
      'a row of nothing known',
      `${csv()}${','.repeat(27)}x${','.repeat(13)}\r\n`,
      6,
      null,
      'neither a plate nor a mount',
    ],
  ])('%s', (_what, text, row, column, words) => {
    expectFault(text, row, column, words);
  });

  it('every cut of a file is refused or leaves whole rows only', () => {
    const text = csv();
    for (let end = lines[0]?.length ?? 0; end < text.length; end += 7) {
      const reading = readCabinet(text.slice(0, end), 'csv', NOW);
      if (!reading.ok) continue;
      for (const { seats } of reading.document.plates) {
        for (const { calibrations } of seats)
          for (const one of calibrations) expect(one).toMatchObject({ recordedBy: 'Ines Okafor' });
      }
    }
  });

  it('JSON, with the path of what is wrong', () => {
    expect(faultsOf('{"format":', 'json')[0]?.message).toContain('no JSON');
    expect(faultsOf('[]', 'json')[0]?.message).toContain('no JSON object');
    expect(faultsOf('{"format":"other/1"}', 'json')[0]).toMatchObject({ column: 'format' });
    const json = writeCabinet(good, 'json');
    expect(
      faultsOf(json.replace('"retardanceDeg":179.2', '"retardanceDeg":"179.2"'), 'json')[0],
    ).toMatchObject({
      row: null,
      column: 'plates.0.seats.0.calibrations.0.retardanceDeg',
    });
    const ofSeat = faultsOf(json.replace('"leftWhy":"Cleaned."', '"leftWhy":7'), 'json');
    expect(ofSeat.map(({ message }) => message.slice(0, 5))).toEqual(['H-1: ']);
    expect(faultsOf(json.replace('"serial"', '"ID"'), 'json').map(({ column }) => column)).toEqual([
      'plates.0.serial',
      'plates.0.ID',
    ]);
    expect(
      faultsOf(json.replace('"mount":{"name":"M-1"', '"mount":{"name":"M-7"'), 'json')[0]?.message,
    ).toContain('no mount M-7');
    expect(readCabinet(json.replace('"backlashDeg":0', '"backlashDeg":-0'), 'json', NOW)).toEqual({
      ok: true,
      document: good,
    });
  });

  it('of more than is read at once, before any of it is', () => {
    expectFault(`${csv()}${'x'.repeat(maxDocumentBytes)}`, null, null, 'larger than 4 MB');
    expectFault(
      `${csv()}${`${lines[4] ?? ''}\n`.repeat(maxDocumentRows)}`,
      maxDocumentRows + 2,
      null,
      `at most ${maxDocumentRows} rows`,
    );
    const many = `{"format":"quarterturn.cabinet/1","mounts":[${'0,'.repeat(1_000_000)}0],"plates":[]}`;
    expect(faultsOf(many, 'json').map(({ message }) => message)).toEqual([
      expect.stringContaining('at most'),
    ]);
    const nested = `{"format":"quarterturn.cabinet/1","mounts":[${'['.repeat(1_000_000)}`;
    expect(faultsOf(nested, 'json')).toHaveLength(1);
  });

  it('with a hundred faults and no more', () => {
    const many = `{"format":"quarterturn.cabinet/1","mounts":[${'0,'.repeat(5000)}0],"plates":[]}`;
    const faults = faultsOf(many, 'json');
    expect(faults).toHaveLength(maxFaults + 1);
    expect(faults.some(({ message }) => message.includes('more than 100 faults'))).toBe(true);
  });
});
