import { useId, useRef, useState } from 'react';
import { MAX_CSV_BYTES } from '../../../../shared/protocol/target-csv';
import { Button } from '../../../components/Button';
import { TextArea } from '../../../components/TextArea';

interface CsvFieldsProps {
  readonly text: string;
  readonly onText: (text: string) => void;
}

/** Rows to paste, or to take from a file; the file's text then stands in the field and can be mended there. */
export function CsvFields({ text, onText }: CsvFieldsProps) {
  const file = useRef<HTMLInputElement>(null);
  const inputId = useId();
  const [fault, setFault] = useState<string | null>(null);
  const take = async (chosen: File) => {
    const read = await textOf(chosen);
    setFault(read.ok ? null : read.sentence);
    if (read.ok) onText(read.text);
  };
  return (
    <div className="grid gap-3">
      <TextArea
        label="rows: a label and an expression, or an expression alone"
        help="Comma, semicolon or tab between them; lines that begin with # are left out."
        mono
        rows={8}
        spellCheck={false}
        value={text}
        placeholder={'label,expression\nd+,(H + V)/sqrt(2)'}
        onChange={(event) => {
          setFault(null);
          onText(event.target.value);
        }}
      />
      <div>
        <label htmlFor={inputId} className="sr-only">
          A file of rows
        </label>
        <input
          ref={file}
          id={inputId}
          type="file"
          accept=".csv,.tsv,.txt,text/csv,text/plain"
          className="sr-only"
          tabIndex={-1}
          onChange={(event) => {
            const chosen = event.target.files?.[0];
            // Emptied, so that the same file can be chosen again after it was mended.
            event.target.value = '';
            if (chosen !== undefined) void take(chosen);
          }}
        />
        <Button onClick={() => file.current?.click()}>Take them from a file</Button>
      </div>
      <p role="alert" className="m-0 text-s font-strong text-fault">
        {fault}
      </p>
    </div>
  );
}

type TakenText =
  { readonly ok: true; readonly text: string } | { readonly ok: false; readonly sentence: string };

async function textOf(file: File): Promise<TakenText> {
  if (file.size > MAX_CSV_BYTES) {
    return { ok: false, sentence: `${file.name} is longer than 1 MB. Take out what is not a target.` };
  }
  try {
    const bytes = await file.arrayBuffer();
    const text = new TextDecoder('utf-8', { fatal: true }).decode(bytes);
    return text.includes('\u0000')
      ? { ok: false, sentence: `${file.name} is not text. Save it as CSV in UTF-8.` }
      : { ok: true, text };
  } catch {
    return { ok: false, sentence: `${file.name} can’t be read as UTF-8 text. Save it as CSV in UTF-8.` };
  }
}
