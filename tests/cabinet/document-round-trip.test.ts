import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import {
  type CabinetDocument,
  cabinetDocumentSchema,
  emptyDocument,
  planImport,
  readCabinet,
  writeCabinet,
} from '../../shared/cabinet-document';
import { guarded, numberCell, readNumberCell, unguarded } from '../../shared/cabinet-document/csv-cells';
import { csvRecords } from '../../shared/cabinet-document/csv-records';
import { canonicalJson } from '../../shared/protocol/canonical-json';
import { anyDocument, NOW } from './document-generator';
import { applied } from './apply-plan';

const read = (text: string, format: 'csv' | 'json'): CabinetDocument => {
  const reading = readCabinet(text, format, NOW);
  if (!reading.ok) throw new Error(JSON.stringify(reading.faults.slice(0, 3)));
  return reading.document;
};

describe('a cabinet as a file', () => {
  it('comes back from CSV and from JSON as the very same document, byte for byte when written again', () => {
    let rows = 0;
    fc.assert(
      fc.property(anyDocument, (document) => {
        for (const format of ['csv', 'json'] as const) {
          const text = writeCabinet(document, format);
          const back = read(text, format);
          expect(back).toEqual(document);
          expect(writeCabinet(back, format)).toBe(text);
          rows += text.length;
        }
      }),
      { numRuns: 80 },
    );
    // Not a law of empty cabinets.
    expect(rows).toBeGreaterThan(80_000);
  });

  it('reads the same with a byte order mark, with other line ends, and in any order of rows and columns', () => {
    fc.assert(
      fc.property(anyDocument, fc.nat(), (document, seed) => {
        const text = writeCabinet(document, 'csv');
        expect(read(`\ufeff${text}`, 'csv')).toEqual(document);
        const rows = [...csvRecords(text, ',')].map(({ cells }) => cells);
        const turned = (list: readonly (readonly string[])[]) =>
          list.map((cells) => cells.map((_cell, place) => cells[(place + seed) % cells.length] ?? ''));
        const [header = [], ...below] = turned(rows);
        const lines = [header, ...below.toReversed()].map((cells) =>
          cells.map((cell) => `"${cell.replaceAll('"', '""')}"`).join(';'),
        );
        // Calibrations of one moment keep the order of their rows, so those documents are another one turned round.
        fc.pre(
          document.plates.every(({ seats }) =>
            seats.every(
              ({ calibrations }) =>
                new Set(calibrations.map(({ measuredAt }) => measuredAt)).size === calibrations.length,
            ),
          ),
        );
        expect(read(lines.join('\n'), 'csv')).toEqual(document);
      }),
      { numRuns: 40 },
    );
  });

  it('is what the schema says', () => {
    fc.assert(
      fc.property(anyDocument, (document) => {
        expect(cabinetDocumentSchema.parse(document)).toEqual(document);
        expect(writeCabinet(document, 'json')).toBe(canonicalJson(document));
      }),
      { numRuns: 50 },
    );
  });

  it('has no text cell that begins like a formula', () => {
    fc.assert(
      fc.property(
        fc.string({ unit: 'binary' }),
        fc.constantFrom('', '=', '+', '-', '@', '\t', '\r', '\n', '\0', "'"),
        (text, head) => {
          const cell = guarded(head + text);
          expect('=+-@\t\r\n\0'.includes(cell.charAt(0))).toBe(cell === '');
          expect(unguarded(cell)).toBe(head + text);
        },
      ),
    );
    fc.assert(
      fc.property(anyDocument, (document) => {
        const [, ...rows] = csvRecords(writeCabinet(document, 'csv'), ',');
        for (const cell of rows.flatMap(({ cells }) => cells)) {
          expect(/^[=+\-@\t\r\n\0]/u.test(cell) && !/^-\d/u.test(cell), cell).toBe(false);
        }
      }),
      { numRuns: 40 },
    );
  });

  it('writes each number so that it reads back as the same one, and reads nothing else as a number', () => {
    fc.assert(
      fc.property(fc.double({ noNaN: true, noDefaultInfinity: true }), (value) => {
        expect(readNumberCell(numberCell(value))).toBe(value + 0);
      }),
    );
    expect(
      ['NaN', 'Infinity', '1e999', '0x10', '1,5', '1_0', '', '１', '--1', '1.'].map(readNumberCell),
    ).toEqual(Array.from({ length: 10 }, () => null));
    expect([readNumberCell('\u22125'), readNumberCell('-0')]).toEqual([-5, 0]);
  });
});

describe('importing', () => {
  const nothing = ({ changes, refused }: ReturnType<typeof planImport>) => ({ changes, refused });

  it('what was exported changes nothing', () => {
    fc.assert(
      fc.property(anyDocument, (document) => {
        expect(nothing(planImport(document, document))).toEqual({ changes: [], refused: [] });
      }),
    );
  });

  it('into an empty lab adds all of it, and then nothing', () => {
    fc.assert(
      fc.property(anyDocument, (document) => {
        const plan = planImport(emptyDocument, document);
        expect(plan.refused).toEqual([]);
        const after = applied(emptyDocument, plan);
        expect(after).toEqual(document);
      }),
    );
  });

  it('one cabinet into another removes nothing, leaves a cabinet that can be read, and is done when it is done', () => {
    let taken = 0;
    fc.assert(
      fc.property(anyDocument, anyDocument, (present, wanted) => {
        const plan = planImport(present, wanted);
        const after = applied(present, plan);
        taken += plan.changes.length;
        expect(read(canonicalJson(after), 'json')).toEqual(after);
        const again = planImport(after, wanted);
        expect(again.changes).toEqual([]);
        // What the lab had is as it was, but for facts that the file changes.
        expect(planImport(after, present).changes.filter(({ kind }) => kind.endsWith('-added'))).toEqual([]);
      }),
      { numRuns: 120 },
    );
    expect(taken).toBeGreaterThan(200);
  });
});
