import { useEffect, useRef, useState } from 'react';
import { useNavigate } from 'react-router-dom';
import { TextField } from '../../components/TextField';
import { useCommands } from '../../lib/commands';
import { usePaused } from '../../lib/use-paused';

/** What a list is searched for. It lives in the address; `/` goes to it. */
export function SearchField(props: {
  readonly label: string;
  /** As the address says it. */
  readonly value: string;
  readonly addressOf: (text: string) => string;
}) {
  const { label, value, addressOf } = props;
  const navigate = useNavigate();
  const field = useRef<HTMLInputElement>(null);
  const [text, setText] = useState(value);
  const [known, setKnown] = useState(value);
  const paused = usePaused(text);
  const address = useRef(addressOf);
  useEffect(() => {
    address.current = addressOf;
  });

  // The back button, or a link: the address was changed by another hand than this field's.
  if (value !== known) {
    setKnown(value);
    if (value !== text.trim()) setText(value);
  }
  useEffect(() => {
    if (paused !== text || paused.trim() === value) return;
    void navigate(address.current(paused.trim()), { replace: true, preventScrollReset: true });
  }, [paused, text, value, navigate]);

  useCommands([
    { id: 'cabinet.search', label: 'Search the list', keys: ['/'], run: () => field.current?.focus() },
  ]);
  return (
    <TextField
      ref={field}
      label={label}
      help={
        <span className="max-sm:hidden pointer-coarse:hidden">
          <kbd className="font-mono">/</kbd> comes here
        </span>
      }
      type="search"
      autoComplete="off"
      maxLength={60}
      className="w-96 max-w-full"
      value={text}
      onChange={(event) => setText(event.target.value)}
    />
  );
}
