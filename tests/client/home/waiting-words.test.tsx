import { cleanup, render } from '@testing-library/react';
import { afterEach, describe, expect, it } from 'vitest';
import { can, type Role } from '../../../shared/permissions';
import { type WaitingItem, waitingItemSchema } from '../../../shared/schemas/home';
import { waitingTitle } from '../../../src/features/home/count-words';
import { sharedAxis } from '../../../src/features/home/shared-axis';
import { waitingWords } from '../../../src/features/home/waiting-words';

afterEach(cleanup);

const labId = '0190a000-0000-7000-8000-0000000000aa';
const now = new Date(2026, 5, 16, 9, 0);

function words(item: unknown, role: Role = 'lead') {
  const parsed: WaitingItem = waitingItemSchema.parse(item);
  const { title, reason, way } = waitingWords(parsed, {
    labId,
    now,
    dueDays: 90,
    may: (action) => can({ userId: 'u', labId, role }, action, { labId }),
  });
  return {
    title: render(<p>{title}</p>).container.textContent,
    reason: render(<p>{reason}</p>).container.textContent,
    way,
  };
}

const daysAgo = (days: number) => new Date(now.getTime() - days * 86_400_000).toISOString();

const run = {
  id: '0190a000-0000-7000-8000-000000000011',
  number: 231,
  state: 'paused',
  protocolId: '0190a000-0000-7000-8000-000000000012',
  protocolName: 'Six states',
  versionId: '0190a000-0000-7000-8000-000000000013',
  versionNumber: 8,
  benchName: 'signal arm',
  settingCount: 24,
  doneCount: 7,
  skippedCount: 1,
  pauseNote: 'cryostat refill, back at nine',
  startedAt: new Date(2026, 5, 15, 18, 4).toISOString(),
  startedBy: 'Juno Petrak',
  finishedAt: null,
};
const standing = { nextSetting: 9, lastDoneSetting: 8 };
const due = {
  kind: 'calibration-due',
  plateId: '0190a000-0000-7000-8000-000000000001',
  plateName: 'Q-D',
  measuredAt: daysAgo(102),
  daysLeft: -12,
  benchNames: ['signal arm', 'diode table'],
};

describe('the title of home', () => {
  it('counts in words up to twelve', () => {
    expect([0, 1, 6, 12, 13].map(waitingTitle)).toEqual([
      'Nothing waits for you',
      'One thing waits for you',
      'Six things wait for you',
      'Twelve things wait for you',
      '13 things wait for you',
    ]);
  });
});

describe('what waits, in sentences', () => {
  it('says at which setting a run stands, why, and where the dials are', () => {
    const { title, reason, way } = words({ kind: 'run-stands', run, ...standing });
    expect(title).toBe('Run 231 stands paused at setting 9 of 24 on the signal arm');
    expect(reason).toBe(
      'Six states 8, started by Juno Petrak yesterday 18:04: “cryostat refill, back at nine”.The dials stand where setting 8 left them.',
    );
    expect(way).toEqual({ label: 'Open the run', to: `/labs/${labId}/bench/runs/${run.id}` });
  });

  it('goes by what is open and what was done last, not by how many are gone', () => {
    const skipped = words({ kind: 'run-stands', run, nextSetting: 4, lastDoneSetting: 11 });
    expect(skipped.title).toBe('Run 231 stands paused at setting 4 of 24 on the signal arm');
    expect(skipped.reason).toContain('The dials stand where setting 11 left them.');
    const passed = words({
      kind: 'run-stands',
      run: { ...run, state: 'running' },
      nextSetting: null,
      lastDoneSetting: null,
    });
    expect(passed.title).toBe('Run 231 stands open after its last setting on the signal arm');
    expect(passed.reason).not.toContain('The dials stand');
  });

  it('leads a guest to the record of a run, never to the bench', () => {
    expect(words({ kind: 'run-stands', run, ...standing }, 'guest').way).toEqual({
      label: 'See the run',
      to: `/labs/${labId}/bench/runs/${run.id}/record`,
    });
  });

  it('counts the days of a calibration past, on the day, and ahead', () => {
    expect(words(due).title).toBe('Q-D is 12 days past its calibration');
    expect(words({ ...due, measuredAt: daysAgo(91) }).title).toBe('Q-D is 1 day past its calibration');
    expect(words({ ...due, measuredAt: daysAgo(90) }).title).toBe('Q-D is due for calibration today');
    // 16 June 2026 is a Tuesday.
    expect(words({ ...due, measuredAt: daysAgo(87) }).title).toBe('Q-D is due for calibration on Friday');
    expect(words({ ...due, measuredAt: daysAgo(80) }).title).toBe('Q-D is due for calibration in 10 days');
    expect(words(due).reason).toContain('It stands in the beam of the signal arm and diode table.');
  });

  it('offers the calibration to those who may record one', () => {
    expect(words(due, 'operator').way?.label).toBe('Calibrate Q-D');
    expect(words(due, 'guest').way).toEqual({
      label: 'Open Q-D',
      to: `/labs/${labId}/cabinet/${due.plateId}`,
    });
  });

  it('puts both figures to a target that was not dialled within', () => {
    const { title, reason } = words({
      kind: 'dialled-not-within',
      run: { ...run, state: 'finished', number: 229 },
      label: 'R',
      dialledInfidelity: 7e-4,
      toleranceInfidelity: 5e-4,
    });
    expect(title).toBe('Run 229 of Six states: R was not dialled within tolerance');
    expect(reason).toMatch(/7\.0.*against.*5\.0/);
  });

  it('leads a new lab on, step by step, and only those who may take it', () => {
    expect(words({ kind: 'no-plates' }).way?.to).toBe(`/labs/${labId}/cabinet?do=add`);
    expect(words({ kind: 'no-bench' }, 'designer').way?.to).toBe(`/labs/${labId}/bench/new`);
    expect(words({ kind: 'no-protocol' }, 'designer').way?.to).toBe(`/labs/${labId}/plan/new`);
    for (const kind of ['no-plates', 'no-bench', 'no-protocol']) {
      const { way, reason } = words({ kind }, 'operator');
      expect(way).toBeNull();
      expect(reason).toMatch(/A designer or the lead/);
    }
  });
});

describe('one axis for all protocols', () => {
  it('holds every value and every tolerance, over at least three powers of ten', () => {
    expect(
      sharedAxis([
        { dialledInfidelity: 7e-4, toleranceInfidelity: 5e-4 },
        { dialledInfidelity: 2.9e-3, toleranceInfidelity: 5e-3 },
        { dialledInfidelity: 8.9e-5, toleranceInfidelity: 5e-4 },
      ]),
    ).toEqual([-2, -5]);
    expect(sharedAxis([{ dialledInfidelity: 2e-3, toleranceInfidelity: 1e-3 }])).toEqual([0, -3]);
    expect(sharedAxis([{ dialledInfidelity: 0, toleranceInfidelity: 1e-3 }])).toEqual([0, -3]);
  });
});

describe('versions that a change left behind', () => {
  const stale = {
    kind: 'stale-versions',
    subject: {
      kind: 'plate',
      id: '0190a000-0000-7000-8000-000000000001',
      name: 'H-3',
      change: 'recalibrated',
      zeroShiftDeg: 0.06,
      zeroShiftSigmaDeg: 0.04,
    },
    versionCount: 3,
    asDialled: { outCount: 0, worstInfidelity: 7e-6, worstLabel: 'c+' },
    voidCount: 0,
  };

  it('says what moved, and what the dials make now', () => {
    const { title, reason, way } = words(stale);
    expect(title).toBe('Three versions hold angles from before H-3’s new zero');
    expect(reason).toMatch(
      /^H-3’s zero moved by \+0\.06\(4\)°\. As dialled now the worst target, c\+, has 1 − F 7\.0×10−6.*; all stay within tolerance\.\s*$/,
    );
    expect(way).toEqual({
      label: 'See what a re-solve gives',
      to: `/labs/${labId}/cabinet/0190a000-0000-7000-8000-000000000001`,
    });
  });

  it('calls dials void where a seat ended, and counts what is not within', () => {
    const subject = { ...stale.subject, change: 'seat-ended', zeroShiftDeg: null, zeroShiftSigmaDeg: null };
    const unseated = words({ ...stale, subject, versionCount: 1, asDialled: null, voidCount: 1 });
    expect(unseated.title).toBe('One version holds angles from before H-3’s new seat');
    expect(unseated.reason).toBe('Its dials are void until it is re-solved.');
    const out = words({ ...stale, asDialled: { ...stale.asDialled, outCount: 2 }, voidCount: 1 });
    expect(out.reason).toMatch(
      /2 targets are not within tolerance\. The dials of one are void until re-solved\./,
    );
  });
});
