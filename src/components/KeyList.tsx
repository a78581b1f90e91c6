import { useState } from 'react';
import { type Command, singleLettersAreOn, switchSingleLetters, useCommands } from '../lib/commands';
import { Button } from './Button';
import { Dialog } from './Dialog';

const names: Readonly<Record<string, string>> = {
  ArrowUp: 'Up',
  ArrowDown: 'Down',
  ArrowLeft: 'Left',
  ArrowRight: 'Right',
  ' ': 'Space',
};

function inWords(key: string): string {
  return key
    .split('+')
    .map((part) => names[part] ?? (part.length === 1 && key.length > 1 ? part.toUpperCase() : part))
    .join('+');
}

/** Behind `?`: what the keys of this page do, and the switch for those that are single letters. */
export function KeyList({ commands }: { readonly commands: readonly Command[] }) {
  const [open, setOpen] = useState(false);
  const [letters, setLetters] = useState(singleLettersAreOn);
  useCommands([{ id: 'keys', label: 'List the keys', keys: ['?'], run: () => setOpen(true) }]);
  return (
    <Dialog
      open={open}
      question="What do the keys do here?"
      onClose={() => setOpen(false)}
      actions={<Button onClick={() => setOpen(false)}>Close the list</Button>}
    >
      <table className="w-full border-collapse">
        <tbody>
          {commands.map(({ id, label, keys }) => (
            <tr key={id} className="border-b border-hair">
              <th scope="row" className="py-1 text-left font-words">
                {label}
              </th>
              <td className="text-right font-mono text-s">{keys.map(inWords).join(' or ')}</td>
            </tr>
          ))}
          <tr className="border-b border-hair">
            <th scope="row" className="py-1 text-left font-words">
              Go to a station, or home
            </th>
            <td className="text-right font-mono text-s">g, then p r b s c l q h</td>
          </tr>
        </tbody>
      </table>
      <label className="flex min-h-10 items-center gap-3">
        <input
          type="checkbox"
          className="size-5 accent-ink"
          checked={letters}
          onChange={(event) => {
            switchSingleLetters(event.target.checked);
            setLetters(event.target.checked);
          }}
        />
        Single letters act
      </label>
    </Dialog>
  );
}
