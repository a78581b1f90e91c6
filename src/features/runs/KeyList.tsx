import { useState } from 'react';
import { type Command, singleLettersAreOn, switchSingleLetters } from '../../lib/commands';

const shownKey = (key: string): string => (key === ' ' ? 'Space' : key);

/** What each key does, and the switch that takes single keys away (WCAG 2.1.4). */
export function KeyList({ commands }: { readonly commands: readonly Command[] }) {
  const [on, setOn] = useState(singleLettersAreOn);
  return (
    <section aria-label="Keys" className="bench-keys">
      <dl>
        {commands.map(({ id, keys, label }) => (
          <div key={id}>
            <dt>
              <kbd className="font-mono">{keys.map(shownKey).join(' or ')}</kbd>
            </dt>
            <dd>{label}</dd>
          </div>
        ))}
      </dl>
      <label className="flex min-h-11 cursor-pointer items-center gap-3">
        <input
          type="checkbox"
          className="size-5 accent-act"
          checked={on}
          onChange={(event) => {
            switchSingleLetters(event.currentTarget.checked);
            setOn(event.currentTarget.checked);
          }}
        />
        single keys act outside fields
      </label>
    </section>
  );
}
