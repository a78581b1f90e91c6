import { type DragEvent, useState } from 'react';
import { Button } from '../../components/Button';
import { classNames } from '../../components/class-names';
import { FileField } from '../../components/FileField';
import { TextArea } from '../../components/TextArea';
import { TextButton } from '../../components/TextLink';
import { maxFileWords } from '../../lib/upload';

interface ScanFilePartProps {
  /** Of the chosen one; null before. */
  readonly chosen: string | null;
  readonly fault: string | null;
  readonly sending: { readonly name: string; readonly share: number } | null;
  readonly onCancel: () => void;
  readonly onFile: (file: File) => void;
}

/** Chooses a scan's file: from the list of files, dropped here, or its rows pasted. */
export function ScanFilePart({ chosen, fault, sending, onCancel, onFile }: ScanFilePartProps) {
  const [isOver, setIsOver] = useState(false);
  const [dropFault, setDropFault] = useState<string | null>(null);
  const take = (file: File) => {
    setDropFault(null);
    onFile(file);
  };
  const drop = (event: DragEvent) => {
    event.preventDefault();
    setIsOver(false);
    const [file, another] = event.dataTransfer.files;
    if (file === undefined) setDropFault('No file was dropped. Drop one file, or paste its rows.');
    else if (another !== undefined) setDropFault('One scan is one file. Drop one of them.');
    else take(file);
  };
  return (
    <div
      onDragOver={(event) => {
        event.preventDefault();
        setIsOver(true);
      }}
      onDragLeave={() => setIsOver(false)}
      onDrop={drop}
      className={classNames('border border-dashed p-3', isOver ? 'border-ink bg-wash' : 'border-rule')}
    >
      <FileField
        label="the scan’s file"
        help={`CSV or other plain text, at most ${maxFileWords}: the dial’s reading and one power or two on each line. Choose it, or drop it here.`}
        fault={dropFault ?? fault}
        chosen={chosen}
        accept=".csv,.tsv,.txt,.dat,text/plain,text/csv"
        onFile={take}
        sending={sending}
        onCancel={onCancel}
      />
      <PasteRows onFile={take} />
    </div>
  );
}

function PasteRows({ onFile }: { readonly onFile: (file: File) => void }) {
  const [isOpen, setIsOpen] = useState(false);
  const [text, setText] = useState('');
  const [isTried, setIsTried] = useState(false);
  if (!isOpen) {
    return (
      <p className="mt-2">
        <TextButton onClick={() => setIsOpen(true)}>Paste the rows instead</TextButton>
      </p>
    );
  }
  const read = () => {
    setIsTried(true);
    if (text.trim() === '') return;
    // A last line that is typed has no end of its own.
    const ended = text.endsWith('\n') ? text : `${text}\n`;
    onFile(new File([ended], 'pasted.csv', { type: 'text/plain' }));
    setIsOpen(false);
  };
  return (
    <div className="mt-3 space-y-3">
      <TextArea
        label="rows, with their header where there is one"
        mono
        rows={6}
        value={text}
        onChange={({ target }) => setText(target.value)}
        fault={isTried && text.trim() === '' ? 'Paste the rows of the scan first.' : null}
        spellCheck={false}
      />
      <div className="flex flex-wrap gap-3">
        <Button onClick={read}>Read the rows</Button>
        <Button kind="quiet" onClick={() => setIsOpen(false)}>
          Close
        </Button>
      </div>
    </div>
  );
}
