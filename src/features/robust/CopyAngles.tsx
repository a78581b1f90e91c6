import { useState } from 'react';
import { Button } from '../../components/Button';
import { TextArea } from '../../components/TextArea';

/** Puts a setting on the clipboard as plain text; where the browser refuses, it stands there to be copied by hand. */
export function CopyAngles({ text }: { readonly text: string }) {
  // Which text was copied: words about it go when another setting is looked at.
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
        <Button onClick={() => void copy()}>Copy the angles</Button>
        <span role="status" className="text-s text-ink-2">
          {current?.copied === true && 'Copied, one plate a line.'}
          {current?.copied === false &&
            'The browser did not let them be copied. Copy them by hand from here.'}
        </span>
      </div>
      {current?.copied === false && (
        <TextArea
          label="the setting as text"
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
