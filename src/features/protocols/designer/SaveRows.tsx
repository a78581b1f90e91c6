import { useState } from 'react';
import type { Convention } from '../../../../shared/optics/convention';
import { writeTargetCsv } from '../../../../shared/protocol/target-csv';
import type { DraftContent } from '../../../../shared/schemas/protocols';
import { TextButton } from '../../../components/TextLink';
import { saveFile } from '../../../lib/save-file';

interface SaveRowsProps {
  readonly content: DraftContent;
  readonly convention: Convention;
}

/** The rows as a file that names its convention and that this page reads back. */
export function SaveRows({ content, convention }: SaveRowsProps) {
  const [fault, setFault] = useState<string | null>(null);
  const save = () => {
    try {
      saveFile(`${content.name} rows.csv`, writeTargetCsv(content.targets, convention), 'text/csv');
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
