import { QueryClient, QueryClientProvider } from '@tanstack/react-query';
import { cleanup, fireEvent, render, screen, within } from '@testing-library/react';
import userEvent from '@testing-library/user-event';
import { MemoryRouter } from 'react-router-dom';
import { afterEach, beforeEach, describe, expect, it, vi } from 'vitest';
import {
  emptyDocument,
  type ImportPlan,
  type ImportRequest,
  importRequestSchema,
  planImport,
  writeCabinet,
} from '../../../shared/cabinet-document';
import type { Role } from '../../../shared/permissions';
import { LabContext } from '../../../src/features/labs';
import { Component as ExchangePage } from '../../../src/features/exchange/ExchangePage';
import { cabinet, calibration, mount, plate, seat } from '../../cabinet/document-fixture';

const lab = {
  id: '0190a000-0000-7000-8000-0000000000aa',
  name: 'Tern Street quantum optics',
  convention: { phase: 'kz-wt', handedness: 'receiver', s3Sign: 'L' },
  calibrationDueDays: 90,
} as const;
const user = { id: '0190a000-0000-7000-8000-0000000000bb', name: 'Adaeze Holm', login: 'aholm', email: null };

const here = cabinet([mount('M-1')], [plate('H-1', [seat('M-1', 1, null, [calibration(2)])])]);
const wanted = cabinet(
  [mount('M-1', { backlashDeg: 0.2 }), mount('M-2')],
  [
    plate('H-1', [seat('M-1', 1, 3, [calibration(2)])]),
    plate('Q-1', [seat('M-2', -9, null, [calibration(3), calibration(4)])]),
  ],
);
const planHash = 'a'.repeat(64);

let sent: ImportRequest[] = [];
let plan: ImportPlan;
/** What the server answers next, in place of success. */
let refusal: {
  readonly status: number;
  readonly type: string;
  readonly detail: string;
  readonly fields?: readonly unknown[];
} | null;

beforeEach(() => {
  sent = [];
  refusal = null;
  plan = planImport(here, wanted);
  vi.stubGlobal('fetch', (_url: string, init: RequestInit) => {
    const body = importRequestSchema.parse(JSON.parse(typeof init.body === 'string' ? init.body : ''));
    sent.push(body);
    const answer =
      refusal === null
        ? { imported: !body.dryRun, plan, planHash }
        : { title: 'Refused', requestId: 'r', ...refusal, type: `urn:quarterturn:problem:${refusal.type}` };
    return Promise.resolve(new Response(JSON.stringify(answer), { status: refusal?.status ?? 200 }));
  });
});
afterEach(() => {
  cleanup();
  vi.unstubAllGlobals();
});

function open(role: Role = 'designer') {
  const queryClient = new QueryClient({ defaultOptions: { mutations: { retry: false } } });
  render(
    <QueryClientProvider client={queryClient}>
      <MemoryRouter>
        <LabContext value={{ lab, user, member: { userId: user.id, labId: lab.id, role } }}>
          <ExchangePage />
        </LabContext>
      </MemoryRouter>
    </QueryClientProvider>,
  );
  return userEvent.setup({ applyAccept: false });
}

/** jsdom's own bytes are none that Node's decoder takes. */
function fileOf(bytes: Uint8Array<ArrayBuffer>, name: string): File {
  return Object.defineProperty(new File([bytes], name), 'arrayBuffer', {
    value: () => Promise.resolve(bytes.buffer),
  });
}
const csvFile = (text = writeCabinet(wanted, 'csv'), name = 'cabinet.csv') =>
  fileOf(new TextEncoder().encode(text), name);
const choose = (person: ReturnType<typeof open>, file = csvFile()) =>
  person.upload(screen.getByLabelText(/A file to choose/u), file);

/** The words of a row as a wide window shows them; what only a phone has is left out. */
const shownCells = (row: HTMLElement): readonly string[] =>
  [...row.children].map((cell) => {
    const copy = cell.cloneNode(true);
    if (copy instanceof HTMLElement)
      for (const extra of copy.querySelectorAll('.sm\\:hidden')) extra.remove();
    return copy.textContent ?? '';
  });

describe('export', () => {
  it('is there for a guest as CSV and JSON and says what is not in it; import is not', () => {
    open('guest');
    const link = (name: string) => screen.getByRole('link', { name }).getAttribute('href');
    expect(link('Save the cabinet as CSV')).toBe(`/api/v1/labs/${lab.id}/cabinet/export?format=csv`);
    expect(link('Save the cabinet as JSON')).toBe(`/api/v1/labs/${lab.id}/cabinet/export?format=json`);
    expect(screen.getByText(/Scans, fits, photos and data sheets are not in it/u)).toBeTruthy();
    expect(screen.getByText(/Designers and leads import plates/u)).toBeTruthy();
    expect(screen.queryByLabelText(/A file to choose/u)).toBeNull();
  });
});

describe('import', () => {
  it('shows a chosen file’s changes as a table before anything changes, and imports that very plan', async () => {
    const person = open();
    await choose(person);
    const table = await screen.findByRole('table', { name: 'What would change' });
    expect(sent).toMatchObject([
      { dryRun: true, planHash: null, format: 'csv', fileText: writeCabinet(wanted, 'csv') },
    ]);
    const rows = within(table).getAllByRole('row').slice(1).map(shownCells);
    expect(rows).toEqual([
      ['mount M-1', 'changes', 'backlash, degrees', '0', '0.2'],
      ['mount M-2', 'new', 'mount', '—', 'by hand, steps of 0.1°'],
      [
        'H-1 in M-1',
        'ends',
        'seat',
        expect.stringMatching(/^since /u),
        expect.stringMatching(/^ends .*: Cleaned\.$/u),
      ],
      ['plate Q-1', 'new', 'plate', '—', 'half-wave plate for 810 nm'],
      ['Q-1 in M-2', 'new', 'seat', '—', expect.stringMatching(/^since /u)],
      [
        'Q-1 in M-2',
        'new',
        expect.stringMatching(/^calibration of /u),
        '—',
        '179.2(3)°, zero 12.40(5)° at 810 nm, by Ines Okafor',
      ],
      ['Q-1 in M-2', 'new', expect.stringMatching(/^calibration of /u), '—', expect.any(String)],
    ]);
    expect(
      screen.getByText(/New: 1 mount, 1 plate, 1 seat and 2 calibrations\. Changed: 1 mount\. 1 seat ends/u),
    ).toBeTruthy();
    await person.click(
      screen.getByRole('button', {
        name: 'Import 1 mount, 1 plate, 1 seat and 2 calibrations, change 1 mount',
      }),
    );
    expect(await screen.findByText('cabinet.csv is imported')).toBeTruthy();
    expect(sent[1]).toMatchObject({ dryRun: false, planHash });
    expect(screen.getByRole('link', { name: 'See the cabinet' }).getAttribute('href')).toBe(
      `/labs/${lab.id}/cabinet`,
    );
  });

  it('takes the keyboard to what it found, and leaves the cabinet as it was', async () => {
    const person = open();
    await choose(person);
    await screen.findByRole('table');
    expect(document.activeElement?.getAttribute('aria-label')).toBe('cabinet.csv: what would change');
    await person.click(screen.getByRole('button', { name: 'Leave it as it was' }));
    expect(screen.getByLabelText(/A file to choose/u)).toBeTruthy();
    expect(sent).toHaveLength(1);
  });

  it('takes a file that is dropped, and text that is pasted, each by what it is', async () => {
    const person = open();
    const zone = screen.getByLabelText(/A file to choose/u);
    fireEvent.drop(zone, { dataTransfer: { files: [csvFile(writeCabinet(wanted, 'json'), 'cabinet.txt')] } });
    await screen.findByRole('table');
    expect(sent[0]?.format).toBe('json');
    await person.click(screen.getByRole('button', { name: 'Leave it as it was' }));
    await person.click(screen.getByLabelText('Or the text of one, pasted'));
    await person.paste('plate,mount\n');
    await person.click(screen.getByRole('button', { name: 'Look at the pasted text' }));
    await screen.findByRole('table');
    expect(sent[1]).toMatchObject({ format: 'csv', fileText: 'plate,mount\n' });
  });

  it('lists a file’s faults by row and column', async () => {
    refusal = {
      status: 422,
      type: 'unreadable-file',
      detail: 'The file has 2 faults.',
      fields: [
        { path: 'rows.4.retardance_deg', message: 'No number.' },
        { path: 'rows.9', message: 'Cut off.' },
      ],
    };
    const person = open();
    await choose(person);
    const table = await screen.findByRole('table', { name: 'The faults of the file' });
    const rows = within(table)
      .getAllByRole('row')
      .map(({ textContent }) => textContent);
    expect(rows).toEqual(['rowcolumnwhat is wrong', '4retardance_degNo number.', '9the whole rowCut off.']);
    await person.click(screen.getByRole('button', { name: 'Choose another file' }));
    expect(screen.getByLabelText(/A file to choose/u)).toBeTruthy();
  });

  it('says what can’t be taken and why, and what is here already, folded', async () => {
    plan = planImport(
      here,
      cabinet([mount('M-1')], [plate('H-1', [seat('M-1', -9, -8), seat('M-1', 1, null, [calibration(2)])])]),
    );
    const person = open();
    await choose(person);
    expect(await screen.findByText(/an earlier one that this lab does not have/u)).toBeTruthy();
    expect(screen.getByText(/would change nothing/u)).toBeTruthy();
    expect(
      screen.getByText(/1 mount, 1 plate, 1 seat and 1 calibration of the file/u).closest('details')?.open,
    ).toBe(false);
    expect(screen.queryByRole('button', { name: /^Import/u })).toBeNull();
  });

  it('a plan that is no longer the one shown is looked at again', async () => {
    const person = open();
    await choose(person);
    await screen.findByRole('table');
    refusal = { status: 409, type: 'plan-changed', detail: 'The cabinet has changed since the dry run.' };
    await person.click(screen.getByRole('button', { name: /^Import/u }));
    expect((await screen.findByRole('alert')).textContent).toContain(
      'The cabinet has changed since the dry run.',
    );
    refusal = null;
    await person.click(screen.getByRole('button', { name: 'Look at what would change now' }));
    await screen.findByRole('table');
    expect(sent.map(({ dryRun }) => dryRun)).toEqual([true, false, true]);
  });

  it('refuses unsent what is too large or no UTF-8', async () => {
    const person = open();
    await choose(person, fileOf(new Uint8Array([0x50, 0xfc, 0x72]), 'old.csv'));
    expect(await screen.findByText(/old\.csv is no text in UTF-8/u)).toBeTruthy();
    await choose(person, csvFile('x'.repeat(4 * 1024 * 1024 + 1), 'large.csv'));
    expect(await screen.findByText(/large\.csv has 4\.0 MB/u)).toBeTruthy();
    expect(sent).toEqual([]);
  });

  it('a long plan comes in parts', async () => {
    plan = planImport(emptyDocument, cabinet(Array.from({ length: 150 }, (_, nth) => mount(`M-${nth}`))));
    const person = open();
    await choose(person);
    const table = await screen.findByRole('table');
    expect(within(table).getAllByRole('row')).toHaveLength(101);
    await person.click(screen.getByRole('button', { name: 'Show more changes' }));
    expect(within(table).getAllByRole('row')).toHaveLength(151);
  });
});
