import { AgreementSign } from './AgreementSign';
import { type ComparedRow, differingNames } from './compared-rows';
import { flagWords, knowledgeWords, listWords } from './flag-words';

/** A convention by its name, its flags, and how well each of them is known. */
export function RowName({ row }: { readonly row: ComparedRow }) {
  return (
    <>
      <span className="font-strong block">{row.name}</span>
      <span className="text-s font-words text-ink block">{flagWords(row.convention)}</span>
      {row.set !== null && (
        <span className="text-xs font-words text-ink-2 block">{knowledgeWords(row.set)}</span>
      )}
    </>
  );
}

function agreementWords(row: ComparedRow): string {
  if (row.typed) return 'typed in this';
  const names = differingNames(row);
  if (names.length > 0) return `differs: ${listWords(names)}`;
  return row.sameFlags ? 'agrees: the same flags' : 'agrees here, by other flags';
}

/** Whether a convention writes what was typed, in words with their sign. */
export function RowAgreement({ row }: { readonly row: ComparedRow }) {
  const agrees = differingNames(row).length === 0;
  return (
    <span className="text-s inline-flex items-start gap-1">
      <AgreementSign agrees={agrees} />
      <span className={agrees ? 'text-ink-2' : 'font-strong'}>{agreementWords(row)}</span>
    </span>
  );
}
