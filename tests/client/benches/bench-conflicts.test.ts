import { describe, expect, it } from 'vitest';
import { benchConflicts, plateConflicts } from '../../../src/features/benches/bench-conflicts';
import { cabinetPlate, calibration, id, now } from './fixture';

const here = { id: id(50), name: 'signal arm', wavelengthNm: 810, temperatureC: null };
const once = { part: 'preparation', times: 1 } as const;
const time = { calibrationDueDays: 90, now };
const said = (
  plate: ReturnType<typeof cabinetPlate>,
  bench: Partial<typeof here> = {},
  place: { readonly part: 'preparation'; readonly times: number } = once,
) =>
  plateConflicts(plate, place, { ...here, ...bench }, time).map(
    ({ kind, sentence }) => `${kind}: ${sentence}`,
  );

describe('what speaks against a plate at its place', () => {
  it('is nothing for one that is calibrated here, on this bench and no other', () => {
    expect(said(cabinetPlate(1, 'H-1', { benches: [{ id: here.id, name: here.name }] }))).toEqual([]);
  });

  it('is a fault for what the server refuses: another bench, twice on this one, retired', () => {
    const elsewhere = cabinetPlate(1, 'H-1', { benches: [{ id: id(51), name: 'idler arm' }] });
    expect(said(elsewhere, {}, { part: 'preparation', times: 2 })).toEqual([
      'fault: H-1 stands in the beam of idler arm. Choose another, or take it out there first.',
      'fault: H-1 is in this beam twice, and one plate stands in one place. Take it out of the other.',
    ]);
    expect(
      said(cabinetPlate(1, 'H-1', { retiredAt: '2026-11-01T09:00:00.000Z', seat: null, calibration: null })),
    ).toEqual(['fault: H-1 is retired. Return it in the cabinet, or choose another.']);
  });

  it('warns of a plate that was taken out, or not measured since it was seated, in the words that a waiting bench has', () => {
    expect(said(cabinetPlate(1, 'H-1', { seat: null, calibration: null }))).toEqual([
      'warning: H-1 sits in no mount. Seat it and calibrate it, then signal arm can be used again.',
    ]);
    expect(said(cabinetPlate(1, 'H-1', { calibration: null }), { name: '' })).toEqual([
      'warning: H-1 has not been calibrated since it was seated. Calibrate it, then this bench can be used again.',
    ]);
  });

  it('names each question that a calibration left open', () => {
    const open = cabinetPlate(1, 'Q-1', {
      kind: 'quarter',
      calibration: calibration({ retardanceDeg: 88.9, openQuestions: ['axis', 'branch'] }),
    });
    expect(said(open)).toEqual([
      expect.stringMatching(/^warning: Which axis of Q-1 is the fast one is not settled\. .*other hand\.$/),
      'warning: Q-1 retards by 88.9(3)° or by 271.1(3)°: its calibration could not tell which.',
    ]);
    const blind = cabinetPlate(1, 'H-1', { calibration: calibration({ openQuestions: ['blind'] }) });
    expect(said(blind)).toEqual([expect.stringContaining('hardly felt its retardance, so close to 180°')]);
    const circular = cabinetPlate(1, 'Q-1', {
      kind: 'quarter',
      calibration: calibration({ retardanceDeg: 88.9942809823223, openQuestions: ['blind'] }),
    });
    expect(said(circular)[0]).toMatch(/so close to 90°: it may be further from 89.0\(3\)° than/);
  });

  it('warns of a calibration past its due date by the lab’s own rule', () => {
    const old = cabinetPlate(1, 'H-1', {
      calibration: calibration({ measuredAt: '2026-08-10T09:00:00.000Z' }),
    });
    expect(said(old)).toEqual(['warning: H-1’s calibration is 12 days over. Calibrate it again.']);
  });

  it('warns of a plate that was calibrated at another wavelength', () => {
    expect(said(cabinetPlate(1, 'H-1'), { wavelengthNm: 780 })[0]).toMatch(
      /^warning: H-1 was calibrated at 810\u202fnm\. At 780\u202fnm it is taken as 18\d\.\d\d°/,
    );
    const unknown = cabinetPlate(1, 'H-1', { construction: 'unknown', material: null });
    expect(said(unknown, { wavelengthNm: 805 })).toEqual([
      'warning: H-1 was calibrated at 810\u202fnm, and this bench runs at 805\u202fnm. How it follows that is not known, so its 179.2(3)° are used as measured: calibrate it at 805\u202fnm.',
    ]);
  });

  it('warns of a plate made for light far from this bench’s, by as much as that alone changes', () => {
    // 180° · (633/810 − 1) = −39.3°.
    const red = cabinetPlate(1, 'H-1', { designWavelengthNm: 633, calibration: null, seat: null });
    expect(said(red)[1]).toBe(
      'warning: H-1 is made as a half-wave plate for 633\u202fnm, and this bench runs at 810\u202fnm: expect about 39° less.',
    );
    const measured = cabinetPlate(1, 'H-1', { designWavelengthNm: 633 });
    expect(said(measured)).toEqual([
      'warning: H-1 is made as a half-wave plate for 633\u202fnm, and this bench runs at 810\u202fnm: here it is taken as 179.2°.',
    ]);
    // Ten whole waves make 3 nm as far as a zero-order plate's 60 nm.
    const close = { designWavelengthNm: 807, seat: null, calibration: null } as const;
    expect(said(cabinetPlate(1, 'H-1', close))).toHaveLength(1);
    expect(said(cabinetPlate(1, 'H-1', { ...close, construction: 'multi-order', order: 10 }))).toHaveLength(
      2,
    );
    expect(
      said(cabinetPlate(1, 'H-1', { ...close, designWavelengthNm: 633, construction: 'achromatic' })),
    ).toHaveLength(1);
  });

  it('warns outside the range of a plate’s coating, its ends within it', () => {
    const coated = cabinetPlate(1, 'H-1', { coatingNm: { from: 650, to: 810 } });
    expect(said(coated)).toEqual([]);
    const sentences = said(coated, { wavelengthNm: 810.5 });
    expect(sentences.at(-1)).toBe(
      'warning: H-1 is coated for 650 to 810\u202fnm, and this bench runs at 810.5\u202fnm: it throws back more of the light.',
    );
  });

  it('says nothing of light at a wavelength that the bench would be refused with', () => {
    for (const wavelengthNm of [8.1, 81_000, Number.NaN]) {
      expect(said(cabinetPlate(1, 'H-1', { coatingNm: { from: 650, to: 700 } }), { wavelengthNm })).toEqual(
        [],
      );
    }
  });

  it('counts a plate of both parts of a bench as one that stands twice', () => {
    const plate = cabinetPlate(1, 'H-1');
    const conflicts = benchConflicts(
      [
        { part: 'preparation', plate },
        { part: 'analysis', plate },
      ],
      here,
      time,
    );
    expect(conflicts.map(({ kind }) => kind)).toEqual(['fault', 'fault']);
  });
});
