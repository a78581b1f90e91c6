import { type DragEvent, useState } from 'react';
import { maxDocumentBytes, maxDocumentRows } from '../../../shared/cabinet-document/limits';
import { Button } from '../../components/Button';
import { classNames } from '../../components/class-names';
import { FileField } from '../../components/FileField';
import { TextArea } from '../../components/TextArea';
import { groupDigits } from '../../lib/format';
import { type CabinetFile, pastedFile, readFile } from './file-text';

/** A file to import: chosen, dropped, or pasted as text. */
export function ChooseFile({ onFile }: { readonly onFile: (file: CabinetFile) => void }) {
  const [pasted, setPasted] = useState('');
  const [fault, setFault] = useState<string | null>(null);
  const [isOver, setIsOver] = useState(false);
  const take = async (chosen: File) => {
    const read = await readFile(chosen);
    setFault(read.ok ? null : read.sentence);
    if (read.ok) onFile(read.file);
  };
  const drop = (event: DragEvent) => {
    event.preventDefault();
    setIsOver(false);
    const [dropped] = event.dataTransfer.files;
    if (dropped !== undefined) void take(dropped);
  };
  return (
    <div className="grid grid-cols-1 items-start gap-5 lg:grid-cols-2 lg:gap-10">
      <div
        onDragOver={(event) => {
          event.preventDefault();
          setIsOver(true);
        }}
        onDragLeave={() => setIsOver(false)}
        onDrop={drop}
        className={classNames('border border-dashed p-4', isOver ? 'border-ink bg-glass' : 'border-rule')}
      >
        <FileField
          label="A file to choose, or to drop here"
          accept=".csv,.json,text/csv,application/json"
          help={`CSV or JSON as an export writes it, at most ${groupDigits(String(maxDocumentRows))} rows or ${maxDocumentBytes / 1024 / 1024} MB.`}
          fault={fault}
          onFile={(file) => void take(file)}
        />
      </div>
      <div>
        <TextArea
          label="Or the text of one, pasted"
          mono
          rows={4}
          spellCheck={false}
          value={pasted}
          onChange={(event) => setPasted(event.target.value)}
        />
        <Button
          className="mt-3"
          waitsFor={pasted.trim() === '' ? 'text to read' : undefined}
          onClick={() => onFile(pastedFile(pasted))}
        >
          Look at the pasted text
        </Button>
      </div>
    </div>
  );
}
