// @vitest-environment jsdom
import { act, cleanup, fireEvent, render, screen } from '@testing-library/react';
import { userEvent } from '@testing-library/user-event';
import { useState } from 'react';
import { MemoryRouter } from 'react-router-dom';
import { afterEach, beforeEach, describe, expect, it, vi } from 'vitest';
import { ageWords } from '../../../src/components/AgeRing';
import { BeamNavigation } from '../../../src/components/BeamNavigation';
import { BeamWorking } from '../../../src/components/BeamState';
import { Button } from '../../../src/components/Button';
import { DataCell, DataRow, DataTable } from '../../../src/components/DataTable';
import { Dialog } from '../../../src/components/Dialog';
import { FidelityChip, fidelityWords } from '../../../src/components/FidelityChip';
import { fidelityVerdict } from '../../../src/components/fidelity-verdict';
import { NumberField } from '../../../src/components/NumberField';
import { savingWords } from '../../../src/components/SaveState';
import { UndoSentence } from '../../../src/components/UndoSentence';

beforeEach(() => {
  // jsdom has no modal dialogs; what is tested here is what our component adds to the browser's own.
  HTMLDialogElement.prototype.showModal = function showModal() {
    this.open = true;
  };
  HTMLDialogElement.prototype.close = function close() {
    this.open = false;
  };
});
afterEach(() => {
  cleanup();
  vi.useRealTimers();
});

describe('a field', () => {
  it('ties its fault to the control in place of the help', () => {
    const { rerender } = render(<NumberField label="exposure, seconds" help="above 0" />);
    const field = screen.getByRole('textbox', { name: 'exposure, seconds' });
    const described = (): string =>
      document.getElementById(field.getAttribute('aria-describedby') ?? '')?.textContent ?? '';
    expect(described()).toBe('above 0');
    expect(field.getAttribute('aria-invalid')).toBeNull();
    rerender(
      <NumberField label="exposure, seconds" help="above 0" fault="An exposure is above 0: 30, not −30." />,
    );
    expect(described()).toBe('An exposure is above 0: 30, not −30.');
    expect(field.getAttribute('aria-invalid')).toBe('true');
  });

  it('shows a typed hyphen as the true minus, and is no number input', async () => {
    const user = userEvent.setup();
    const seen: string[] = [];
    render(
      <NumberField
        label="change"
        onChange={(event) => {
          seen.push(event.currentTarget.value);
        }}
      />,
    );
    const field = screen.getByRole('textbox');
    expect(field.getAttribute('type')).toBe('text');
    expect(field.getAttribute('inputmode')).toBe('decimal');
    await user.type(field, '-3');
    expect(seen.at(-1)).toBe('\u22123');
  });
});

describe('a button that waits', () => {
  it('says for what, keeps its place in the Tab order and does nothing', async () => {
    const user = userEvent.setup();
    const press = vi.fn();
    render(
      <Button waitsFor="row 8 can’t be read" onClick={press} type="submit">
        Save version 15
      </Button>,
    );
    const button = screen.getByRole('button', { name: /^Save version 15 ?, waits: row 8 can’t be read$/ });
    await user.tab();
    expect(document.activeElement).toBe(button);
    await user.click(button);
    expect(press).not.toHaveBeenCalled();
    expect(button.getAttribute('aria-disabled')).toBe('true');
    expect(button.getAttribute('type')).toBe('button');
  });
});

function Asking({ onVerb }: { readonly onVerb: () => void }) {
  const [open, setOpen] = useState(false);
  return (
    <>
      <button
        type="button"
        onClick={() => {
          setOpen(true);
        }}
      >
        Withdraw
      </button>
      <Dialog
        open={open}
        question="Withdraw version 12?"
        onClose={() => {
          setOpen(false);
        }}
        actions={<Button onClick={onVerb}>Withdraw version 12</Button>}
      >
        No run can start on it.
      </Dialog>
    </>
  );
}

describe('a dialog', () => {
  it('asks with the focus on the question; Esc is never the verb, and the focus goes back', async () => {
    const user = userEvent.setup();
    const verb = vi.fn();
    render(<Asking onVerb={verb} />);
    const opener = screen.getByRole('button', { name: 'Withdraw' });
    await user.click(opener);
    const dialog = screen.getByRole('dialog', { name: 'Withdraw version 12?' });
    expect(document.activeElement?.textContent).toBe('Withdraw version 12?');
    // What a browser sends for Esc in a modal dialog.
    fireEvent(dialog, new Event('cancel', { cancelable: true }));
    expect(screen.queryByRole('dialog')).toBeNull();
    expect(verb).not.toHaveBeenCalled();
    expect(document.activeElement).toBe(opener);
  });
});

describe('a table', () => {
  it('moves by cell with the arrows, by row with Home and End, by table with Ctrl', async () => {
    const user = userEvent.setup();
    render(
      <DataTable caption="numbers">
        <tbody>
          {['a', 'b', 'c'].map((row) => (
            <DataRow key={row}>
              {[1, 2, 3].map((column) => (
                <DataCell key={column}>{`${row}${column}`}</DataCell>
              ))}
            </DataRow>
          ))}
        </tbody>
      </DataTable>,
    );
    const here = (): string => document.activeElement?.textContent ?? '';
    await user.tab();
    expect(here()).toBe('a1');
    await user.keyboard('{ArrowRight}{ArrowDown}');
    expect(here()).toBe('b2');
    await user.keyboard('{End}');
    expect(here()).toBe('b3');
    await user.keyboard('{Home}');
    expect(here()).toBe('b1');
    await user.keyboard('{Control>}{End}{/Control}');
    expect(here()).toBe('c3');
    await user.keyboard('{ArrowDown}{ArrowRight}');
    expect(here()).toBe('c3');
    // One cell is in the Tab order, the last one that was visited.
    await user.tab();
    await user.tab({ shift: true });
    expect(here()).toBe('c3');
  });
});

describe('the beam navigation', () => {
  const targets = {
    plan: { href: '/plan' },
    review: { href: '/review', waiting: 1 },
    bench: { href: '/bench' },
    results: { href: '/results' },
    cabinet: { href: '/cabinet', waiting: 2 },
    lab: { href: '/lab' },
    quick: { href: '/quick' },
  };
  const actions = { onSignOut: vi.fn(), onSignOutEverywhere: vi.fn() };

  it('is a nav of links with one current page and what waits said in words', () => {
    render(
      <MemoryRouter>
        <BeamNavigation
          current="plan"
          homeHref="/"
          targets={targets}
          person={{ name: 'Adaeze Holm', initials: 'AH' }}
          actions={actions}
        />
      </MemoryRouter>,
    );
    expect(screen.getByRole('navigation', { name: 'Quarterturn' })).toBeTruthy();
    expect(document.querySelectorAll('[aria-current="page"]')).toHaveLength(1);
    expect(screen.getByRole('link', { name: 'Plan' }).getAttribute('aria-current')).toBe('page');
    expect(screen.getByRole('link', { name: /^Review ?, one thing waits$/ }).getAttribute('href')).toBe(
      '/review',
    );
  });

  it('opens the person by key, and Esc closes it and gives the focus back', async () => {
    const user = userEvent.setup();
    render(
      <MemoryRouter>
        <BeamNavigation
          current={null}
          homeHref="/"
          targets={targets}
          person={{ name: 'Adaeze Holm', initials: 'AH' }}
          actions={actions}
        />
      </MemoryRouter>,
    );
    const person = screen.getByRole('button', { name: /Adaeze Holm/ });
    person.focus();
    await user.keyboard('{Enter}');
    expect(person.getAttribute('aria-expanded')).toBe('true');
    await user.keyboard('{Escape}');
    expect(person.getAttribute('aria-expanded')).toBe('false');
    expect(document.activeElement).toBe(person);
  });
});

describe('work in progress', () => {
  it('is silent for 300 ms, owes the time left and Cancel past 10 s, and its light never goes back', () => {
    vi.useFakeTimers();
    const work = (done: number) => (
      <BeamWorking doing="Solving" unit="row" done={done} total={8} onCancel={() => undefined} />
    );
    const { rerender, container } = render(work(4));
    expect(screen.queryByRole('progressbar')).toBeNull();
    act(() => {
      vi.advanceTimersByTime(400);
    });
    expect(screen.getByRole('progressbar').getAttribute('aria-valuetext')).toBe('Solving, row 4 of 8');
    const light = (): string | null | undefined => container.querySelector('circle')?.getAttribute('cx');
    expect(light()).toBe('50.00%');
    rerender(work(2));
    expect(light()).toBe('50.00%');
    expect(screen.queryByRole('button', { name: 'Cancel' })).toBeNull();
    act(() => {
      vi.advanceTimersByTime(11_000);
    });
    expect(screen.getByRole('button', { name: 'Cancel' })).toBeTruthy();
    expect(container.textContent).toMatch(/about \d+ s left/);
  });
});

describe('an undo sentence', () => {
  it('goes after ten seconds, and Ctrl+Z takes it back before', () => {
    vi.useFakeTimers();
    const undo = vi.fn();
    const gone = vi.fn();
    render(<UndoSentence sentence="Row 4 taken out." onUndo={undo} onGone={gone} />);
    act(() => {
      vi.advanceTimersByTime(9_900);
    });
    expect(gone).not.toHaveBeenCalled();
    fireEvent.keyDown(window, { key: 'z', ctrlKey: true });
    expect(undo).toHaveBeenCalledTimes(1);
    act(() => {
      vi.advanceTimersByTime(200);
    });
    expect(gone).toHaveBeenCalled();
  });
});

describe('verdicts and words', () => {
  it('decides only when the whole interval lies on one side', () => {
    expect(fidelityVerdict({ value: 1.8e-4, low: 1e-4, high: 2e-4 }, 5e-4)).toBe('within');
    expect(fidelityVerdict({ value: 4.6e-4, low: 4e-4, high: 6e-4 }, 5e-4)).toBe('not decided');
    expect(fidelityVerdict({ value: 11e-4, low: 9e-4, high: 14e-4 }, 5e-4)).toBe('not within');
    expect(fidelityWords({ value: 11e-4, low: 9e-4, high: 14e-4 }, 5e-4, 'measured')).toBe(
      '1 − F 1.1e−3, 95 % interval 9.0e−4 to 1.4e−3, tolerance 5.0e−4: not within',
    );
  });

  it.each(['measured', 'predicted'] as const)('draws the verdict of a %s one in its point', (kind) => {
    const point = (low: number, high: number) => {
      const { container, unmount } = render(
        <FidelityChip kind={kind} tolerance={5e-4} infidelity={{ value: (low + high) / 2, low, high }} />,
      );
      const dot = container.querySelector('circle')?.getAttribute('class') ?? 'a cross';
      unmount();
      return dot;
    };
    expect(point(1e-4, 2e-4)).toContain('fill-ink');
    expect(point(4e-4, 6e-4)).toContain('fill-paper');
    expect(point(9e-4, 14e-4)).toBe('a cross');
  });

  it('counts an age by its quarter, and says when nothing is known', () => {
    expect(ageWords(27, 90)).toBe('27 days of 90');
    expect(ageWords(104, 90)).toBe('14 days over');
    expect(ageWords(null, 90)).toBe('never calibrated');
  });

  it('has three words for saving', () => {
    expect(savingWords({ kind: 'typed' })).toBe('typed');
    expect(savingWords({ kind: 'kept' })).toBe('kept on this device');
    expect(savingWords({ kind: 'kept', waiting: 3 }, 'reading', 'readings')).toBe(
      '3 readings wait on this device',
    );
    const saved = { kind: 'saved', at: new Date(2026, 5, 16, 10, 42, 7) } as const;
    const on = (day: number) => savingWords(saved, 'change', 'changes', new Date(2026, 5, day, 18));
    expect([on(16), on(17), on(19)]).toEqual([
      'saved 10:42:07',
      'saved yesterday 10:42',
      'saved 16 June 10:42',
    ]);
  });
});
