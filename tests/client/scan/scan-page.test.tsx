// @vitest-environment jsdom
import { cleanup, screen, waitFor, within } from '@testing-library/react';
import { afterEach, beforeEach, describe, expect, it, vi } from 'vitest';
import type { CalibrationDetail } from '../../../shared/schemas/scans';
import { linearRows, linearScanText, knownLightText, textOf } from '../../support/scan-text';
import { csv, detailOf, fileId, NearWorker, openScan, page, plate, type Sent } from './scan-harness';

const TRUTH = { offsetDeg: 121.73, retardanceDeg: 86.9, direction: -1 } as const;
const HEAD = 'dial (deg);crossed (mW);parallel (mW)';
const PLAIN = linearScanText({ truth: TRUTH, seed: 3, count: 31, fromDeg: 240 });

beforeEach(() => {
  HTMLDialogElement.prototype.showModal = function show(this: HTMLDialogElement) {
    this.open = true;
  };
  HTMLDialogElement.prototype.close = function close(this: HTMLDialogElement) {
    this.open = false;
  };
});
afterEach(() => {
  cleanup();
  vi.unstubAllGlobals();
});

async function choose(user: ReturnType<typeof openScan>['user'], file: File) {
  const input = await screen.findByLabelText(/^the scan’s file/u);
  await user.upload(input, file);
}
const fitted = () => screen.findByRole('img', { name: /^Scan of Q-B/u });
const posts = (sent: readonly Sent[]) => sent.filter(({ method }) => method === 'POST');
const recordButton = () => screen.getByRole('button', { name: /^Record this calibration/u });

describe('a scan from the file to the record', () => {
  it('shows how the file was understood, the plot in words, what it tells and leaves open', async () => {
    const { user } = openScan('operator');
    await choose(user, csv(`# lamp on\n${PLAIN}`));
    const plot = await fitted();
    expect(plot.getAttribute('aria-label')).toMatch(/31 points between crossed and parallel polarisers/u);
    screen.getByText(
      /^31 rows\. UTF-8, semicolons between the columns, decimal points, header in line 2, one comment line/u,
    );
    screen.getByText('The header’s words name the columns.');
    const tells = within(screen.getByRole('region', { name: 'What this scan leaves open' }));
    tells.getByRole('heading', { name: 'Fast or slow?' });
    screen.getByText(/zero moved by .*if the same axis is meant; retardance by/u);
    screen.getByText(/what quartz gives/u);
  });

  it('records what it showed, with the columns as they were used, and goes to the plate', async () => {
    const { user, sent, uploads, router } = openScan('operator', { extinction: 1e-6 });
    await choose(user, csv(PLAIN));
    await fitted();
    await waitFor(() => expect(recordButton().getAttribute('aria-disabled')).toBe(null));
    await user.click(recordButton());
    await screen.findByText('another page');
    expect(router.state.location.pathname).toBe(page);
    expect(uploads()).toBe(1);
    const [post] = posts(sent);
    expect(post?.path).toBe(`/plates/${plate.id}/scans`);
    expect(post?.body).toMatchObject({
      fileId,
      columns: {
        dial: { column: 0, unit: 'deg' },
        crossed: { column: 1, unit: 'mW' },
        parallel: { column: 2 },
      },
      light: { kind: 'linear', extinction: { value: 1e-6, sigma: 0 }, power: null },
      leftOut: [],
      wavelengthNm: 810,
      settlesId: null,
    });
  });

  it('loses nothing when it is refused, and sends the file once', async () => {
    const answer = {
      status: 409,
      body: {
        type: 'urn:x',
        title: 'Refused',
        status: 409,
        detail: 'Q-B was changed meanwhile.',
        requestId: 'r',
      },
    };
    const { user, uploads, sent } = openScan('operator', { answer });
    await choose(user, csv(PLAIN));
    await fitted();
    await user.type(screen.getByLabelText('note'), 'after the move');
    await user.click(recordButton());
    await screen.findByText('Q-B was changed meanwhile.');
    await waitFor(() => expect(recordButton().getAttribute('aria-disabled')).toBe(null));
    await user.click(recordButton());
    await waitFor(() => expect(posts(sent)).toHaveLength(2));
    expect(uploads()).toBe(1);
    expect(screen.getByLabelText('note')).toHaveProperty('value', 'after the move');
    await fitted();
  });

  it('reads pasted rows as a file', async () => {
    const { user } = openScan('operator');
    await user.click(await screen.findByRole('button', { name: 'Paste the rows instead' }));
    await user.click(screen.getByRole('button', { name: 'Read the rows' }));
    screen.getByText('Paste the rows of the scan first.');
    await user.click(screen.getByLabelText(/^rows, with/u));
    await user.paste(PLAIN);
    await user.click(screen.getByRole('button', { name: 'Read the rows' }));
    await fitted();
  });

  it('has its numbers in a table, by the button and by the key v', async () => {
    const { user } = openScan('operator');
    await choose(user, csv(PLAIN));
    await fitted();
    await user.click(screen.getByRole('heading', { level: 1 }));
    await user.keyboard('v');
    const table = await screen.findByRole('table', { name: /^Points of the scan/u });
    expect(within(table).getAllByRole('row')).toHaveLength(32);
  });
});

describe('columns', () => {
  const unnamed = PLAIN.replace(HEAD, 'a;b (mW);c (mW)');

  it('are asked for where no word tells, and answered in the head of the rows', async () => {
    const { user } = openScan('operator');
    await choose(user, csv(unnamed));
    await screen.findByText(/^Which column is the power between crossed polarisers/u);
    expect(recordButton().textContent).toMatch(/waits: an answer about the columns/u);
    await user.selectOptions(screen.getByLabelText('what b is'), 'crossed power');
    await user.selectOptions(screen.getByLabelText('what c is'), 'parallel power');
    await fitted();
    await user.selectOptions(screen.getByLabelText('what a is'), 'not used');
    await screen.findByText('Say which column is the dial’s reading.');
    expect(recordButton().textContent).toMatch(/waits: the columns/u);
    // One role is one column's: what had it has none.
    await user.selectOptions(screen.getByLabelText('what a is'), 'parallel power');
    expect(screen.getByLabelText('what c is')).toHaveProperty('value', '');
  });

  it('are as in the lab’s last file that looked alike, said so, and can be the file’s own again', async () => {
    const choice = (column: number) => ({ column, unit: null });
    const remembered = {
      dial: choice(0),
      crossed: choice(1),
      parallel: choice(2),
      crossedSigma: null,
      parallelSigma: null,
    };
    const { user } = openScan('operator', { remembered });
    await choose(user, csv(unnamed));
    await fitted();
    screen.getByText(/as in this lab’s last file that looked alike/u);
    await user.click(screen.getByRole('button', { name: 'Take what the file itself says' }));
    await screen.findByText('The file doesn’t say everything');
  });
});

describe('a file that can’t be used', () => {
  it.each([
    [
      'faults by line and column',
      `${HEAD}\n0;1;2\n5;nan;3\n`,
      'Line 3, column 2 (crossed): “nan” is no measured value. Put the measured number there, or drop the line.',
    ],
    ['a formula', `${HEAD}\n0;1;2\n5;=1+1;3\n`, /is a formula, and formulas are not computed/u],
    ['points that tell nothing', `${HEAD}\n0;1;2\n5;1;2\n`, /2 rows in use, too few/u],
  ])('%s', async (_, text, words) => {
    const { user } = openScan('operator');
    await choose(user, csv(text));
    await screen.findByText(words);
    expect(recordButton().getAttribute('aria-disabled')).toBe('true');
  });

  it('lists the first fifty faults and counts the others', async () => {
    const { user } = openScan('operator');
    await choose(user, csv(`${HEAD}\n0;1;2\n${'5;nan;3\n'.repeat(60)}`));
    const list = await screen.findByRole('region', { name: 'Faults of the file' });
    expect(within(list).getAllByRole('listitem')).toHaveLength(50);
    screen.getByText('And 10 more faults like these.');
  });

  it('an empty one is refused before it is read', async () => {
    const { user } = openScan('operator');
    await choose(user, csv(''));
    await screen.findByText(/scan\.csv is empty/u);
  });
});

describe('lines left out', () => {
  const wild = textOf(
    linearRows({ truth: TRUTH, seed: 3, count: 31 }).map(([dial = 0, crossed = 0, parallel = 0], at) => [
      dial,
      at === 9 ? crossed + 0.2 : crossed,
      parallel,
    ]),
    HEAD,
  );

  it('are left out by a person who says why, put back, and recorded', async () => {
    const { user, sent } = openScan('operator');
    await choose(user, csv(wild));
    await fitted();
    screen.getByText('One row looks wrong, ringed above.');
    await user.click(screen.getByRole('button', { name: 'Leave line 11 out…' }));
    await user.click(screen.getByRole('button', { name: 'Leave line 11 out' }));
    screen.getByText('Write why: the reason stands in the record.');
    await user.type(screen.getByLabelText('why line 11 is left out'), 'The shutter closed.');
    await user.click(screen.getByRole('button', { name: 'Leave line 11 out' }));
    await screen.findByText('Line 11: The shutter closed.');
    await screen.findByRole('img', { name: /30 points .*1 more left out/u });
    await user.click(screen.getByRole('button', { name: 'Put line 11 back' }));
    await screen.findByText('One row looks wrong, ringed above.');
    await user.click(screen.getByRole('button', { name: 'Leave another line out…' }));
    await user.type(screen.getByLabelText('line'), '500');
    await user.type(screen.getByLabelText('why it is left out'), 'wild');
    await user.click(screen.getByRole('button', { name: 'Leave it out' }));
    screen.getByText(/^Line 500 holds no row of the scan/u);
    await user.clear(screen.getByLabelText('line'));
    await user.type(screen.getByLabelText('line'), '11');
    await user.click(screen.getByRole('button', { name: 'Leave it out' }));
    await screen.findByRole('img', { name: /30 points/u });
    await user.click(recordButton());
    await screen.findByText('another page');
    expect(posts(sent)[0]?.body).toMatchObject({ leftOut: [{ line: 11, why: 'wild' }] });
  });
});

describe('light', () => {
  it('of one port asks for the power that enters, and says what comes without', async () => {
    const { user } = openScan('operator');
    await choose(user, csv(linearScanText({ truth: { ...TRUTH, leak: 0 }, ports: 'crossed', seed: 4 })));
    await fitted();
    screen.getByRole('heading', { name: 'The retardance is not told' });
    expect(recordButton().textContent).toMatch(/since nothing told the retardance before/u);
    const power = screen.getByLabelText('power that enters, mW');
    await user.type(power, '1,0');
    await screen.findByText('Write a point in place of the comma: 1.0.');
    await user.clear(power);
    await user.type(power, '1');
    await user.type(screen.getAllByLabelText('its σ')[1] ?? power, '0.001');
    await waitFor(() =>
      expect(screen.queryByRole('heading', { name: 'The retardance is not told' })).toBe(null),
    );
  });

  it('that is known is read in the lab’s convention and settles the axis', async () => {
    const text = knownLightText([0.48, 0.36, 0.8], 0, { truth: TRUTH, seed: 5 });
    const asked =
      plate.calibration === null ? null : { ...plate.calibration, openQuestions: ['axis' as const] };
    const detail = detailOf({ plate: { ...plate, calibration: asked } });
    const { user, sent } = openScan('operator', { detail }, '?light=known');
    await choose(user, csv(text));
    await screen.findByText(/Say how the light went/u);
    const state = screen.getByLabelText('state of the light that comes in');
    await user.click(state);
    await user.paste('stokes(0.48, 0.36');
    await screen.findByText(/^Column/u);
    await user.clear(state);
    await user.paste('stokes(0.48, 0.36, 0.8)');
    await screen.findByText('This scan leaves nothing open: axis and retardance are told.');
    screen.getByText('Recorded so, it settles what the calibration before left open.');
    await user.click(recordButton());
    await screen.findByText('another page');
    expect(posts(sent)[0]?.body).toMatchObject({
      light: { kind: 'known', inputExpression: 'stokes(0.48, 0.36, 0.8)', analyserDeg: 0, beforeId: null },
      columns: { crossed: { column: 1 }, parallel: null },
      settlesId: asked?.id,
    });
  });
});

describe('who and where', () => {
  it('warns before an unrecorded scan is left, once', async () => {
    const { user, router } = openScan('operator');
    await choose(user, csv(PLAIN));
    await fitted();
    await user.click(screen.getByRole('link', { name: 'Back to Q-B' }));
    await screen.findByRole('heading', { name: 'Leave the scan unrecorded?' });
    await user.click(screen.getByRole('button', { name: 'Stay with the scan' }));
    await fitted();
    await user.click(screen.getByRole('link', { name: 'Back to Q-B' }));
    await user.click(await screen.findByRole('button', { name: 'Leave it unrecorded' }));
    await screen.findByText('another page');
    expect(router.state.location.pathname).toBe(page);
  });

  it('lets guests see recorded scans only', async () => {
    openScan('guest');
    await screen.findByText(/Calibrations are recorded by operators, designers and leads/u);
    expect(screen.queryByLabelText(/^the scan’s file/u)).toBe(null);
  });

  it('says that a plate in no mount has to be seated first', async () => {
    const detail = detailOf({ plate: { ...plate, seat: null, calibration: null } });
    openScan('lead', { detail });
    await screen.findByText(/Q-B sits in no mount/u);
    screen.getByRole('link', { name: 'Seat Q-B' });
  });

  it('shows a recorded scan again from its stored file, with its hash and what was left out', async () => {
    if (plate.calibration === null) throw new Error('the plate is calibrated');
    const recorded: CalibrationDetail = {
      calibration: { ...plate.calibration, id: 'c1', fileId },
      scan: {
        file: {
          id: fileId,
          name: 'scan.csv',
          mediaType: 'text/plain',
          sha256: 'abc123',
          sizeBytes: 900,
          uploadedBy: 'x',
          uploadedAt: '2026-11-01T09:00:00.000Z',
        },
        record: {
          format: 'quarterturn.scan/1',
          columns: {
            dial: { column: 0, unit: null },
            crossed: { column: 1, unit: null },
            parallel: { column: 2, unit: null },
            crossedSigma: null,
            parallelSigma: null,
          },
          light: { kind: 'linear', extinction: null, power: null },
          inputStokes: null,
          direction: -1,
          leftOut: [{ line: 5, why: 'wild' }],
          retardanceFrom: 'scan',
          pointCount: 30,
          chiSquared: 28,
          degreesOfFreedom: 27,
          sigmaFrom: 'scatter',
          parameters: {},
          covarianceOf: [],
          covariance: [],
        },
      },
    };
    openScan('guest', { recorded, file: PLAIN }, '?calibration=c1');
    await screen.findByRole('img', { name: /^Scan of Q-B: 30 points .*1 more left out/u });
    // Fitted once, not at every drawing.
    const fits = NearWorker.count;
    await new Promise((resolve) => {
      setTimeout(resolve, 300);
    });
    expect(NearWorker.count).toBe(fits);
    screen.getByText('Line 5: wild');
    screen.getByText(/SHA-256 abc123/u);
  });
});
