import { type Command, useCommands } from '../../lib/commands';

interface BenchCommandsInput {
  /** False while a sheet is open: its keys are its own. */
  readonly enabled: boolean;
  readonly running: boolean;
  readonly onMain: () => void;
  readonly onOther: (() => void) | null;
  readonly onTrouble: () => void;
  readonly onBack: () => void;
  readonly onSettings: () => void;
}

/** A button or link that has the focus takes Space for itself. */
function focusTakesSpace(): boolean {
  const focused = document.activeElement;
  return focused !== null && focused.closest('button, a, summary, input') !== null;
}

/** The keys of the bench, the same list that `?` shows. */
export function useBenchCommands(input: BenchCommandsInput): readonly Command[] {
  const { enabled, running } = input;
  const commands: readonly Command[] = [
    {
      id: 'confirm',
      label: 'confirm the number, or record the setting',
      keys: [' '],
      when: () => enabled && running && !focusTakesSpace(),
      run: input.onMain,
    },
    {
      id: 'other',
      label: 'it says something else',
      keys: ['e'],
      when: () => enabled && input.onOther !== null,
      run: () => input.onOther?.(),
    },
    {
      id: 'trouble',
      label: 'note trouble',
      keys: ['t'],
      when: () => enabled && running,
      run: input.onTrouble,
    },
    { id: 'back', label: 'back one', keys: ['b'], when: () => enabled && running, run: input.onBack },
    {
      id: 'settings',
      label: 'settings, side, light and keys',
      keys: ['?'],
      when: () => enabled,
      run: input.onSettings,
    },
  ];
  useCommands(commands);
  return commands;
}
