import { QueryClientProvider } from '@tanstack/react-query';
import { act, cleanup, fireEvent, render, screen, waitFor, within } from '@testing-library/react';
import userEvent from '@testing-library/user-event';
import { createMemoryRouter, RouterProvider } from 'react-router-dom';
import { afterEach, beforeAll, beforeEach, describe, expect, it, vi } from 'vitest';
import type { Bench, CreateBench } from '../../../shared/schemas/benches';
import type { CabinetPlate } from '../../../shared/schemas/cabinet';
import { LiveRegions } from '../../../src/components/LiveRegions';
import { BenchForm } from '../../../src/features/benches/BenchForm';
import { LabContext } from '../../../src/features/labs';
import { ApiError } from '../../../src/lib/api';
import { createQueryClient } from '../../../src/lib/query-client';
import { bench as anyBench, cabinetPlate, id, lab, order } from './fixture';

const standing = [{ id: id(50), name: 'signal arm' }];
const h1 = cabinetPlate(1, 'H-1', { benches: standing });
const q1 = cabinetPlate(2, 'Q-1', { benches: standing, kind: 'quarter' });
const h4 = cabinetPlate(3, 'H-4', { benches: standing });
const taken = cabinetPlate(4, 'Q-9', { benches: [{ id: id(51), name: 'idler arm' }] });
const signalArm = anyBench({
  id: id(50),
  order: [...order('preparation', h1, q1), ...order('analysis', h4)],
  revision: 3,
});

const asked: string[] = [];
beforeEach(() => {
  asked.length = 0;
  vi.stubGlobal('fetch', (url: string) => {
    asked.push(url);
    const all = [h1, q1, h4, taken];
    const { searchParams } = new URL(url, 'http://localhost');
    const items = all.filter(
      ({ name, kind }) =>
        name.includes(searchParams.get('search') ?? '') && (searchParams.get('kind') ?? kind) === kind,
    );
    return Promise.resolve(new Response(JSON.stringify({ items, nextCursor: null }), { status: 200 }));
  });
});
afterEach(() => {
  cleanup();
  vi.unstubAllGlobals();
});

function open(
  options: {
    readonly bench?: Bench;
    readonly plates?: readonly CabinetPlate[];
    readonly save?: (body: CreateBench, revision: number) => Promise<Bench>;
  } = {},
) {
  const save = vi.fn(options.save ?? (() => Promise.resolve(signalArm)));
  const onSaved = vi.fn();
  const router = createMemoryRouter([
    {
      path: '/',
      element: (
        <LabContext value={lab}>
          <LiveRegions />
          <BenchForm
            bench={options.bench ?? signalArm}
            plates={options.plates ?? [h1, q1, h4]}
            save={save}
            onSaved={onSaved}
          />
        </LabContext>
      ),
    },
    { path: '/elsewhere', element: <p>Elsewhere</p> },
  ]);
  render(
    <QueryClientProvider client={createQueryClient()}>
      <RouterProvider router={router} />
    </QueryClientProvider>,
  );
  return { user: userEvent.setup(), save, onSaved, router };
}

const inOrder = (part: 'preparation' | 'analysis') =>
  within(screen.getByRole('list', { name: `Plates of ${part}, in beam order` }))
    .queryAllByRole('button', { name: /^(?:Grab|Drop) / })
    .map((button) => button.getAttribute('aria-label')?.replace(/^(?:Grab|Drop) /, ''));
const suggestions = (part: string) =>
  within(screen.getByRole('listbox', { name: `Plates of the cabinet, add a plate to ${part}` }));
const button = (name: string) => screen.getByRole('button', { name });
const isSaid = (words: string | RegExp) => expect(screen.getAllByText(words).length).toBeGreaterThan(0);

describe('plates in beam order by keyboard', () => {
  it('are grabbed with Space, moved with the arrows across both parts and dropped, each step said in words', async () => {
    const { user } = open();
    act(() => button('Grab H-1').focus());
    await user.keyboard(' ');
    isSaid(/H-1 grabbed, 1 of 2 in preparation\. Up and Down move it/);
    await user.keyboard('{ArrowDown}');
    expect(inOrder('preparation')).toEqual(['Q-1', 'H-1']);
    isSaid('H-1: 2 of 2 in preparation.');
    await user.keyboard('{ArrowDown}');
    expect([inOrder('preparation'), inOrder('analysis')]).toEqual([['Q-1'], ['H-1', 'H-4']]);
    expect(document.activeElement).toBe(button('Drop H-1'));
    await user.keyboard(' ');
    isSaid('H-1 dropped, 1 of 2 in analysis.');
    // Dropped, it stays where it is whatever the arrows do.
    await user.keyboard('{ArrowUp}');
    expect(inOrder('analysis')).toEqual(['H-1', 'H-4']);
  });

  it('go back to where they were with Escape', async () => {
    const { user } = open();
    act(() => button('Grab H-1').focus());
    await user.keyboard(' {ArrowDown}{ArrowDown}{Escape}');
    expect([inOrder('preparation'), inOrder('analysis')]).toEqual([['H-1', 'Q-1'], ['H-4']]);
    isSaid('H-1 put back, 1 of 2 in preparation.');
  });

  it('move by plain buttons too, which keep the focus and say where there is no way on', async () => {
    const { user } = open();
    await user.click(button('Move Q-1 up'));
    expect(inOrder('preparation')).toEqual(['Q-1', 'H-1']);
    expect(document.activeElement).toBe(button('Move Q-1 up'));
    await user.click(button('Move Q-1 up'));
    isSaid('Q-1 is the first that light meets.');
    await user.click(button('Move H-4 up'));
    expect(inOrder('preparation')).toEqual(['Q-1', 'H-1', 'H-4']);
  });

  it('come back when taking one out is undone', async () => {
    const { user } = open();
    await user.click(button('Take out H-1'));
    expect(inOrder('preparation')).toEqual(['Q-1']);
    expect(document.activeElement).toBe(button('Grab Q-1'));
    isSaid('H-1 taken out of preparation.');
    await user.click(button('Undo'));
    expect(inOrder('preparation')).toEqual(['H-1', 'Q-1']);
  });
});

describe('plates in beam order by drag', () => {
  /** jsdom lays nothing out: rows of 60 px, preparation from 0, analysis from 200. */
  function layOut() {
    vi.spyOn(Element.prototype, 'getBoundingClientRect').mockImplementation(function rect(this: Element) {
      const part = this.closest('[data-part]');
      const top = part?.getAttribute('data-part') === 'analysis' ? 200 : 0;
      const place = [...(part?.querySelectorAll('[data-place]') ?? [])].indexOf(this);
      return new DOMRect(0, top + (place < 0 ? 0 : 40 + 60 * place), 600, 60);
    });
  }
  afterEach(() => {
    vi.restoreAllMocks();
  });
  /** A pointer's event as far as jsdom has one: a mouse's under its name. */
  const point = (target: Element | Window, type: string, clientY: number) =>
    fireEvent(target, new MouseEvent(type, { bubbles: true, button: 0, clientY }));
  const drag = (name: string, fromPx: number, toPx: number) => {
    point(button(name), 'pointerdown', fromPx);
    point(window, 'pointermove', toPx);
    point(window, 'pointerup', toPx);
  };

  it('stand where they are let go, within a part and across both', () => {
    layOut();
    open();
    drag('Grab H-1', 70, 140);
    expect(inOrder('preparation')).toEqual(['Q-1', 'H-1']);
    isSaid('H-1: 2 of 2 in preparation.');
    drag('Grab Q-1', 70, 300);
    expect([inOrder('preparation'), inOrder('analysis')]).toEqual([['H-1'], ['H-4', 'Q-1']]);
  });

  it('stay with Escape, and grab nothing with the click that ends a drag', () => {
    layOut();
    open();
    point(button('Grab H-1'), 'pointerdown', 70);
    point(window, 'pointermove', 140);
    fireEvent.keyDown(window, { key: 'Escape' });
    point(window, 'pointerup', 140);
    fireEvent.click(button('Grab H-1'));
    expect(inOrder('preparation')).toEqual(['H-1', 'Q-1']);
    expect(button('Grab H-1').textContent).toBe('Grab');
  });
});

describe('a plate that is looked for', () => {
  it('is found as one writes, shown with what it is and where it stands, and chosen by keyboard', async () => {
    const { user } = open();
    const finder = screen.getByRole('combobox', { name: 'add a plate to analysis' });
    await user.click(finder);
    await user.keyboard('Q-9');
    const option = await suggestions('analysis').findByRole('option', { name: /^Q-9/ });
    await waitFor(() => expect(suggestions('analysis').getAllByRole('option')).toHaveLength(1));
    expect(option.textContent).toMatch(/half-wave plate, 179\.2\(3\)° at 810nm, in M-1.*stands in idler arm/);
    await user.keyboard('{ArrowDown}');
    expect(finder.getAttribute('aria-activedescendant')).toBe(option.id);
    await user.keyboard('{Enter}');
    expect(inOrder('analysis')).toEqual(['H-4', 'Q-9']);
    expect(suggestions('analysis').queryByRole('option')).toBeNull();
    // At once, beside it, before anything is saved.
    isSaid('Q-9 stands in the beam of idler arm. Choose another, or take it out there first.');
  });

  it('is asked of the server by kind, and said not to be there in words', async () => {
    const { user } = open();
    const [kind] = screen.getAllByRole('combobox', { name: 'kind' });
    if (kind === undefined) throw new Error('no choice of kind');
    await user.selectOptions(kind, 'quarter-wave');
    const finder = screen.getByRole('combobox', { name: 'add a plate to preparation' });
    await user.click(finder);
    expect(
      (await suggestions('preparation').findAllByRole('option')).map(({ textContent }) =>
        textContent.slice(0, 3),
      ),
    ).toEqual(['Q-1']);
    expect(asked.at(-1)).toMatch(/\/plates\?.*kind=quarter/);
    await user.type(finder, 'zzz');
    await screen.findByText('No plate in use has “zzz” in its name, serial, mount or note.');
    await user.keyboard('{Enter}');
    expect(inOrder('preparation')).toEqual(['H-1', 'Q-1']);
  });
});

describe('what is said while a bench is edited', () => {
  it('follows the wavelength, beside the plates that it concerns', async () => {
    const { user } = open();
    expect(screen.queryByText(/was calibrated at/)).toBeNull();
    const wavelength = screen.getByRole('textbox', { name: 'wavelength, nm' });
    await user.clear(wavelength);
    await user.type(wavelength, '780');
    expect(screen.getAllByText(/was calibrated at/)).toHaveLength(3);
  });

  it('follows the laser class, and asks for a ratio only with both detectors', async () => {
    const { user } = open();
    expect(screen.queryByRole('textbox', { name: /efficiency/ })).toBeNull();
    await user.selectOptions(screen.getByRole('combobox', { name: /laser class/ }), 'class 2');
    expect(screen.queryByRole('note', { name: 'Laser caution' })).toBeNull();
    await user.selectOptions(screen.getByRole('combobox', { name: /laser class/ }), 'not stated');
    isSaid(/not stated: take it as one that can hurt/);
    await user.type(screen.getByRole('textbox', { name: /^passed port, detector/ }), 'APD 1');
    await user.type(screen.getByRole('textbox', { name: /^rejected port, detector/ }), 'APD 2');
    expect(screen.getByRole('textbox', { name: 'efficiency, rejected over passed' })).toBeDefined();
  });

  it('puts the server’s word at the plate that it is about', async () => {
    const message = 'H-4 was retired just now. Choose another.';
    const refusal = new ApiError(
      422,
      {
        type: 'urn:problem:refused',
        title: 'Refused',
        status: 422,
        detail: message,
        requestId: '1',
        fields: [{ path: 'analysisPlateIds.0', message }],
      },
      message,
    );
    const { user } = open({ save: () => Promise.reject(refusal) });
    await user.click(button('Save the bench'));
    const said = await screen.findByText(message);
    expect(said.closest('[data-place]')?.querySelector('button')).toBe(button('Grab H-4'));
  });
});

it('saves both parts in their order with the revision it was made against', async () => {
  const { user, save, onSaved } = open();
  await user.click(button('Move H-1 down'));
  await user.click(button('Save the bench'));
  await waitFor(() => expect(onSaved).toHaveBeenCalled());
  expect(save.mock.calls[0]?.[0]).toMatchObject({ plateIds: [q1.id, h1.id], analysisPlateIds: [h4.id] });
  expect(save.mock.calls[0]?.[1]).toBe(3);
});

it('shows both sides where somebody else saved meanwhile, and either can be taken', async () => {
  const theirs: Bench = {
    ...signalArm,
    order: order('preparation', q1, taken),
    detectors: { passed: { name: 'APD 7', darkRatePerS: 80 }, rejected: null, efficiencyRatio: null },
    revision: 4,
  };
  const conflict = new ApiError(
    412,
    {
      type: 'urn:problem:changed',
      title: 'Changed',
      status: 412,
      detail: '',
      requestId: '1',
      current: theirs,
    },
    'changed',
  );
  const { user, save } = open({
    save: (_body, revision) => (revision === 3 ? Promise.reject(conflict) : Promise.resolve(theirs)),
  });
  await user.click(button('Move Q-1 up'));
  await user.click(button('Save the bench'));
  const table = await screen.findByRole('table');
  const rows = within(table)
    .getAllByRole('row')
    .slice(1)
    .map((row) => [...row.children].map(({ textContent }) => textContent));
  expect(rows).toEqual([
    ['passed port: detector’s name', 'APD 7', '—'],
    ['passed port: dark rate, per second', '80', '—'],
    ['plates of the preparation, in beam order', 'Q-1, then Q-9', 'Q-1, then H-1'],
    ['plates of the analysis, in beam order', '—', 'H-4'],
  ]);
  await user.click(button('Take what stands there'));
  expect([inOrder('preparation'), inOrder('analysis')]).toEqual([['Q-1', 'Q-9'], []]);
  await user.click(button('Save the bench'));
  await waitFor(() => expect(save.mock.calls.at(-1)?.[1]).toBe(4));
});

describe('leaving a bench', () => {
  beforeAll(() => {
    HTMLDialogElement.prototype.showModal = function showModal() {
      this.open = true;
    };
    HTMLDialogElement.prototype.close = function close() {
      this.open = false;
    };
  });

  it('asks once while something is typed, and not where nothing is', async () => {
    const { user, router } = open();
    await user.type(screen.getByLabelText('bench’s name'), ' two');
    await act(() => router.navigate('/elsewhere'));
    const asks = within(screen.getByRole('dialog', { name: 'Leave the bench unsaved?' }));
    await user.click(asks.getByRole('button', { name: 'Stay with the bench' }));
    expect(screen.getByLabelText<HTMLInputElement>('bench’s name').value).toMatch(/ two$/);
    await act(() => router.navigate('/elsewhere'));
    await user.click(screen.getByRole('button', { name: 'Leave it unsaved' }));
    expect(await screen.findByText('Elsewhere')).toBeDefined();
    cleanup();
    const untouched = open();
    await act(() => untouched.router.navigate('/elsewhere'));
    expect(await screen.findByText('Elsewhere')).toBeDefined();
  });
});
