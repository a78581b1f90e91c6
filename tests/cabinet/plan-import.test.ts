import { describe, expect, it } from 'vitest';
import { countChanges, emptyDocument, planImport } from '../../shared/cabinet-document';
import { cabinet, calibration, day, mount, plate, seat } from './document-fixture';

const here = cabinet(
  [mount('M-1'), mount('M-2'), mount('M-9', { retiredAt: day(20) })],
  [
    plate('H-1', [seat('M-1', 1, 9, [calibration(2)]), seat('M-1', 9, null, [calibration(10)])]),
    plate('H-0', [seat('M-2', 1, 9)], { retiredAt: day(10) }),
  ],
);
const kinds = (plan: ReturnType<typeof planImport>): string[] => plan.changes.map(({ kind }) => kind);
const reasons = (plan: ReturnType<typeof planImport>): string[] => plan.refused.map(({ reason }) => reason);

describe('what is taken', () => {
  it('a fact, field by field, and a name in other capitals', () => {
    const plan = planImport(
      here,
      cabinet(
        [mount('m-1', { backlashDeg: 0.2, rangeDeg: { from: 0, to: 360 } })],
        [plate('H-1', [], { serial: 'X', coatingNm: { from: 700, to: 900 } })],
      ),
    );
    expect(plan.changes).toMatchObject([
      {
        kind: 'mount-changed',
        mount: { name: 'M-1' },
        fields: [
          { field: 'backlashDeg', before: 0, after: 0.2 },
          { field: 'name', before: 'M-1', after: 'm-1' },
          { field: 'rangeDeg', before: null, after: { from: 0, to: 360 } },
        ],
      },
      {
        kind: 'plate-changed',
        fields: [{ field: 'coatingNm' }, { field: 'serial', before: '', after: 'X' }],
      },
    ]);
    expect(plan.refused).toEqual([]);
  });

  it('a calibration of a seat that both know, and what it settles', () => {
    const open = calibration(10, { openQuestions: ['axis'] });
    const lab = cabinet([mount('M-1')], [plate('H-1', [seat('M-1', 9, null, [open])])]);
    const file = cabinet(
      [mount('M-1')],
      [plate('H-1', [seat('M-1', 9, null, [open, calibration(11, { settles: 1 })])])],
    );
    const plan = planImport(lab, file);
    expect(plan.changes).toMatchObject([
      {
        kind: 'calibration-added',
        position: 2,
        seat: { mount: { name: 'M-1' }, seatedAt: day(9) },
        settles: { isStored: true, position: 1 },
      },
    ]);
    expect(plan.unchanged).toEqual({ mounts: 1, plates: 1, seats: 1, calibrations: 1 });
  });

  it('a later seat, which ends the present one as the file says', () => {
    const file = cabinet(
      [mount('M-1'), mount('M-2')],
      [plate('H-1', [seat('M-1', 9, 30, [calibration(10)]), seat('M-2', 31, null, [calibration(32)])])],
    );
    const plan = planImport(here, file);
    expect(kinds(plan)).toEqual(['seat-ended', 'seat-added', 'calibration-added']);
    expect(plan.changes[0]).toMatchObject({ leftAt: day(30), leftWhy: 'Cleaned.' });
    expect(plan.refused).toEqual([]);
  });

  it('a mount that one plate leaves for another, in whatever order the plates stand', () => {
    const file = cabinet(
      [mount('M-1')],
      [plate('A-1', [seat('M-1', 30, null)]), plate('H-1', [seat('M-1', 9, 30)])],
    );
    expect(planImport(here, file)).toMatchObject({ refused: [] });
    expect(countChanges(planImport(here, file))).toMatchObject({
      'plate-added': 1,
      'seat-added': 1,
      'seat-ended': 1,
    });
  });

  it('nothing that the lab has and the file does not', () => {
    expect(planImport(here, emptyDocument)).toMatchObject({ changes: [], refused: [] });
  });

  it('a name that a person has changed since is no other measurement', () => {
    const file = cabinet(
      [mount('M-1')],
      [plate('H-1', [seat('M-1', 9, null, [calibration(10, { recordedBy: 'I. Okafor' })])])],
    );
    expect(planImport(here, file)).toMatchObject({ changes: [], refused: [] });
  });
});

describe('what is not taken is said with its reason', () => {
  const file = (...seats: Parameters<typeof plate>[1][]) =>
    cabinet(
      [mount('M-1'), mount('M-2')],
      [
        plate(
          'H-1',
          seats.flatMap((one) => one ?? []),
        ),
      ],
    );

  it('an earlier seat that the lab does not have, with what was measured in it', () => {
    const plan = planImport(here, file([seat('M-2', -30, -20, [calibration(-25)])], [seat('M-1', 9, 30)]));
    expect(kinds(plan)).toEqual(['seat-ended']);
    expect(reasons(plan)).toEqual([
      expect.stringContaining('an earlier one that this lab does not have'),
      expect.stringContaining('falls with its seat'),
    ]);
  });

  it('an earlier seat is called one, even where the file says nothing of how the present one ended', () => {
    const plan = planImport(here, file([seat('M-2', -30, -20)], [seat('M-1', 9, null)]));
    expect(reasons(plan)).toEqual([expect.stringContaining('an earlier one that this lab does not have')]);
  });

  it('a later seat where the file does not say how the present one ended', () => {
    expect(reasons(planImport(here, file([seat('M-2', 31, null)])))).toEqual([
      expect.stringContaining('sits in M-1 since'),
    ]);
  });

  it('another end of a seat that has ended', () => {
    const plan = planImport(here, file([seat('M-1', 1, 8)]));
    expect([kinds(plan), reasons(plan)]).toEqual([[], [expect.stringContaining('is never changed')]]);
  });

  it('an end before something that was measured there', () => {
    const plan = planImport(here, cabinet([mount('M-1')], [plate('H-1', [seat('M-1', 9, 9)])]));
    expect([kinds(plan), reasons(plan)]).toEqual([[], [expect.stringContaining('it was measured there at')]]);
  });

  it('a calibration that differs from the stored one of its moment, and one that settles it', () => {
    const other = calibration(10, { retardanceDeg: 91, openQuestions: ['branch'] });
    const plan = planImport(here, file([seat('M-1', 9, null, [other, calibration(12, { settles: 1 })])]));
    expect([kinds(plan), reasons(plan)]).toEqual([
      [],
      [
        expect.stringContaining('differs from the one of that moment'),
        expect.stringContaining('settles one that is not taken'),
      ],
    ]);
  });

  it('a mount that another plate sits in here', () => {
    const plan = planImport(here, cabinet([mount('M-1')], [plate('Q-1', [seat('M-1', 30, null)])]));
    expect([kinds(plan), reasons(plan)]).toEqual([
      ['plate-added'],
      [expect.stringContaining('H-1 sits there since')],
    ]);
  });

  it('what is retired on one side only', () => {
    const retired = cabinet(
      [mount('M-2', { retiredAt: day(30) })],
      [plate('H-1', [], { retiredAt: day(30) }), plate('H-0', [seat('M-2', 1, 9, [], day(30))])],
    );
    const plan = planImport(here, retired);
    expect(kinds(plan)).toEqual([]);
    expect(plan.refused.map(({ what, name }) => `${what} ${name}`)).toEqual([
      'mount M-2',
      'plate H-0',
      'plate H-1',
    ]);
    expect(reasons(plan)).toEqual([
      expect.stringContaining('in use here, and retired in the file'),
      expect.stringContaining('retired here, and in use in the file'),
      expect.stringContaining('in use here, and retired in the file'),
    ]);
  });

  it('but a name that was free is a new plate or mount, whatever once had it', () => {
    const plan = planImport(here, cabinet([mount('M-9')], [plate('H-0', [seat('M-9', 30, null)])]));
    expect([kinds(plan), reasons(plan)]).toEqual([['mount-added', 'plate-added', 'seat-added'], []]);
  });
});
