import fc from 'fast-check';
import {
  type CabinetDocument,
  cabinetFormat,
  type DocumentCalibration,
  type DocumentMount,
  type DocumentPlateHead,
  type DocumentSeat,
  inOrder,
} from '../../shared/cabinet-document';
import { openQuestions } from '../../shared/schemas';

/** When the documents of these tests are read: nothing in them is later. */
export const NOW = new Date('2026-12-01T12:00:00.000Z');
const first = Date.parse('2020-01-01T00:00:00.000Z');
const minuteMs = 60_000;
const at = (minute: number): string => new Date(first + minute * minuteMs).toISOString();
/** The documents' clock runs in minutes from 2020; this many are in the past at `NOW`. */
const MOST_MINUTES = 3_000_000;

/** Numbers of a field, with its ends and what is awkward to write; one zero only. */
const number = (min: number, max: number): fc.Arbitrary<number> =>
  fc
    .oneof(
      fc.constantFrom(min, max, Math.max(min, 1e-7), 0.1 + 0.2 > max ? max : Math.max(min, 0.1 + 0.2)),
      fc.double({ min, max, noNaN: true, noDefaultInfinity: true }),
    )
    .map((value) => value + 0);
const maybe = <T>(value: fc.Arbitrary<T>): fc.Arbitrary<T | null> => fc.option(value, { nil: null });

const awkward = [
  '=1+1',
  '+1',
  '-1',
  '@SUM(A1)',
  "'",
  "''",
  "'=x",
  '"',
  'a,b;c',
  'λ/2 “é” 𝛿',
  'null',
  '1e5',
  '0x1',
  'a\u202e',
  '#N/A',
];
/** As the schemas keep a text: trimmed, no control characters. */
export const line = (maxLength: number): fc.Arbitrary<string> =>
  fc
    .oneof(
      fc.constantFrom(...awkward),
      fc.string({ unit: 'grapheme', maxLength }),
      fc.string({ unit: 'binary', maxLength }),
    )
    .map((text) =>
      text
        .replaceAll(/[\p{Cc}\p{Cs}]/gu, '')
        .slice(0, maxLength)
        .toWellFormed()
        .replaceAll('\ufffd', '?')
        .trim(),
    )
    .map((text) => (text === '' ? 'x' : text));
export const note = (maxLength: number): fc.Arbitrary<string> =>
  fc.oneof(
    fc.constant(''),
    line(maxLength),
    fc.tuple(line(20), line(20)).map(([one, other]) => `${one}\n\t${other}`),
  );

const nameEnd = fc.constantFrom('', ' =b', " 'c", ' "d"', ', e');
const mountFacts = fc.record({
  drive: fc.constantFrom('hand' as const, 'motor' as const),
  note: note(500),
  direction: fc.constantFrom(1 as const, -1 as const),
  resolutionDeg: number(0.001, 10),
  repeatabilityDeg: number(0, 5),
  rangeDeg: maybe(
    fc
      .tuple(number(-720, 500), number(180, 700))
      .map(([from, span]) => ({ from, to: Math.min(1440, from + span) })),
  ).map((range) => (range === null || range.to - range.from < 180 ? null : range)),
  speedDegPerS: maybe(number(0.01, 3600)),
  backlashDeg: number(0, 10),
  approach: fc.constantFrom('rising' as const, 'falling' as const, 'either' as const),
});
const plateFacts = fc.record({
  kind: fc.constantFrom('half' as const, 'quarter' as const, 'other' as const),
  designWavelengthNm: number(200, 5000),
  built: fc.oneof(
    fc.record({
      construction: fc.constantFrom(
        'true-zero-order' as const,
        'compound-zero-order' as const,
        'achromatic' as const,
        'unknown' as const,
      ),
      order: fc.constant(0),
    }),
    fc.record({ construction: fc.constant('multi-order' as const), order: fc.integer({ min: 1, max: 200 }) }),
  ),
  material: fc.constantFrom(
    'quartz' as const,
    'magnesium-fluoride' as const,
    'calcite' as const,
    'sapphire' as const,
    null,
  ),
  serial: note(60),
  clearApertureMm: maybe(number(0.1, 500)),
  coatingNm: maybe(fc.tuple(number(200, 2000), number(2001, 5000)).map(([from, to]) => ({ from, to }))),
  damageNote: note(500),
  note: note(500),
});
const measured = fc.record({
  wavelengthNm: number(200, 5000),
  temperatureC: maybe(number(-50, 150)),
  retardanceDeg: number(0.1, 359.9),
  retardanceSigmaDeg: number(0, 20),
  offsetDeg: number(0, 359.9999),
  offsetSigmaDeg: number(0, 20),
  method: line(80),
  note: note(500),
  openQuestions: fc.subarray([...openQuestions]),
  settles: fc.nat({ max: 20 }),
  recordedBy: line(60),
  /** Minutes after its seat began; cut where the seat ends. */
  after: fc.nat({ max: 5000 }),
});
const stay = fc.record({
  mount: fc.nat({ max: 20 }),
  /** Minutes out of any mount before, and minutes in it; none where it still sits there. */
  gap: fc.nat({ max: 3 }),
  minutes: fc.integer({ min: 1, max: 20_000 }),
  goesOn: fc.boolean(),
  why: line(200),
  calibrations: fc.array(measured, { maxLength: 4 }),
});

/**
 * Any cabinet in its order. Time goes on through the plates, so that no two ever sit in one mount at one time; a last seat may
 * go on where its mount is free of everything that comes later.
 */
export const anyDocument: fc.Arbitrary<CabinetDocument> = fc
  .record({
    mounts: fc.array(fc.tuple(nameEnd, mountFacts, fc.boolean()), { maxLength: 5 }),
    plates: fc.array(fc.tuple(nameEnd, plateFacts, fc.boolean(), fc.array(stay, { maxLength: 4 })), {
      maxLength: 5,
    }),
  })
  .map(({ mounts: someMounts, plates: somePlates }) => {
    const mounts = someMounts.map(([end, facts, isRetired], index): DocumentMount => {
      // Retired ones may have the name of another.
      const name = isRetired && index > 0 ? 'M-1' : `M-${index + 1}${end}`;
      return { ...facts, name, retiredAt: isRetired ? at(MOST_MINUTES - index) : null };
    });
    const lastOf = new Set<number>();
    let clock = 0;
    const plates = somePlates.map(([end, { built, ...facts }, isRetired, stays], index) => {
      const name = isRetired && index > 0 ? 'P-1' : `P-${index + 1}${end}`;
      const head: DocumentPlateHead = {
        ...facts,
        ...built,
        name,
        retiredAt: isRetired ? at(MOST_MINUTES - index) : null,
      };
      const seats =
        mounts.length === 0
          ? []
          : stays.map((one, nth): DocumentSeat => {
              const place = one.mount % mounts.length;
              const mount = mounts[place];
              if (mount === undefined) throw new Error('a place is one of the list');
              clock += one.gap;
              const seatedAt = at(clock);
              const goesOn =
                one.goesOn && nth === stays.length - 1 && mount.retiredAt === null && !lastOf.has(place);
              clock += one.minutes;
              const calibrations = one.calibrations.map(({ after, ...rest }): DocumentCalibration => ({
                ...rest,
                measuredAt: new Date(
                  Date.parse(seatedAt) + Math.min(after, one.minutes) * minuteMs,
                ).toISOString(),
              }));
              if (goesOn) lastOf.add(place);
              return {
                mount: { name: mount.name, retiredAt: mount.retiredAt },
                seatedAt,
                leftAt: goesOn ? null : at(clock),
                leftWhy: goesOn ? null : one.why,
                calibrations,
              };
            });
      return { ...head, seats };
    });
    // A mount that still holds a plate holds none later: those who came into it afterwards are left out.
    const held = new Map<string, string>();
    for (const { seats } of plates) {
      for (const { mount, leftAt, seatedAt } of seats) if (leftAt === null) held.set(mount.name, seatedAt);
    }
    const fitting = plates.map((plate) => ({
      ...plate,
      seats: withSettled(
        plate.seats.filter(
          ({ mount, leftAt, seatedAt }) =>
            leftAt === null || mount.retiredAt !== null || seatedAt <= (held.get(mount.name) ?? '9'),
        ),
      ),
    }));
    return inOrder({ format: cabinetFormat, mounts, plates: fitting });
  });

/** What a calibration is said to settle becomes one before it that left something open, or nothing. */
function withSettled(seats: readonly DocumentSeat[]): DocumentSeat[] {
  const all = seats.flatMap(({ calibrations }) => calibrations);
  let position = 0;
  return seats.map((seat) => ({
    ...seat,
    calibrations: seat.calibrations.map((calibration) => {
      const before = all.slice(0, position);
      position += 1;
      const wanted = before.length === 0 ? 0 : (calibration.settles ?? 0) % before.length;
      const isOpen = (before[wanted]?.openQuestions.length ?? 0) > 0;
      return { ...calibration, settles: isOpen ? wanted + 1 : null };
    }),
  }));
}
