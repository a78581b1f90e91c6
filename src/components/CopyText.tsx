import { useState } from 'react';
import { Button } from './Button';
import { TextArea } from './TextArea';

interface CopyTextProps {
  readonly text: string;
  /** The verb with its object on the button. */
  readonly action: string;
  /** What the text is, as the name of its field. */
  readonly name: string;
  /** Said before anything is copied. */
  readonly about?: string;
  readonly copied: string;
}

/** Puts a text on the clipboard; where the browser refuses, it stands there to be copied by hand. */
export function CopyText({ text, action, name, about, copied }: CopyTextProps) {
  // Which text was copied: words about it go when another is looked at.
  const [outcome, setOutcome] = useState<{ readonly text: string; readonly copied: boolean } | null>(null);
  const current = outcome?.text === text ? outcome : null;
  const copy = async () => {
    try {
      await navigator.clipboard.writeText(text);
      setOutcome({ text, copied: true });
    } catch {
      // Browsers refuse on plain http; the text can still be copied by hand.
      setOutcome({ text, copied: false });
    }
  };
  return (
    <div className="mt-4">
      <div className="flex flex-wrap items-center gap-x-4 gap-y-2">
        <Button onClick={() => void copy()}>{action}</Button>
        <span role="status" className="text-s text-ink-2">
          {current === null && about}
          {current?.copied === true && copied}
          {current?.copied === false && 'The browser did not let it be copied. Copy it by hand from here.'}
        </span>
      </div>
      {current?.copied === false && (
        <TextArea
          label={name}
          className="mt-3"
          mono
          readOnly
          rows={8}
          value={text}
          onFocus={(event) => event.currentTarget.select()}
        />
      )}
    </div>
  );
}
