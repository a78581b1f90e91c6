import { useState } from 'react';
import type { Convention } from '../../../../shared/optics/convention';
import { writeTargetCsv } from '../../../../shared/protocol/target-csv';
import type { DraftContent } from '../../../../shared/schemas/protocols';
import { TextButton } from '../../../components/TextLink';

interface SaveRowsProps {
  readonly content: DraftContent;
  readonly convention: Convention;
}

/** The rows as a file that names its convention and that this page reads back. */
export function SaveRows({ content, convention }: SaveRowsProps) {
  const [fault, setFault] = useState<string | null>(null);
  const save = () => {
    try {
      const text = writeTargetCsv(content.targets, convention);
      const address = URL.createObjectURL(new Blob([text], { type: 'text/csv;charset=utf-8' }));
      const link = document.createElement('a');
      link.href = address;
      link.download = `${content.name} rows.csv`;
      link.click();
      URL.revokeObjectURL(address);
    } catch {
      setFault('This browser keeps no file.');
    }
  };
  return (
    <>
      <TextButton onClick={save}>Save the rows as CSV</TextButton>
      <span role="alert">{fault}</span>
    </>
  );
}
