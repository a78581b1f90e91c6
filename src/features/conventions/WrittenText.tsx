import { classNames } from '../../components/class-names';
import { AgreementSign } from './AgreementSign';
import type { ComparedPart, ComparedValue } from './compared-rows';

/** One number or word of a convention; where it is not the one that was typed it is heavier and has the sign of lines that miss. */
export function WrittenText({
  value,
  sign = true,
}: {
  readonly value: ComparedValue;
  readonly sign?: boolean;
}) {
  const { shown, differs } = value;
  return (
    <span className={classNames('whitespace-nowrap', differs ? 'font-[680]' : 'text-ink-2')}>
      {differs && sign && <AgreementSign agrees={false} />}
      {shown}
      {differs && <span className="sr-only"> (differs)</span>}
    </span>
  );
}

/** A matrix as rows of aligned numbers, without a bracket: that is the sign of tolerance here. */
export function WrittenMatrix({ part }: { readonly part: ComparedPart }) {
  const rows = Array.from({ length: part.values.length / part.columns }, (_, row) =>
    part.values.slice(row * part.columns, (row + 1) * part.columns),
  );
  return (
    <span className="inline-flex items-center gap-1.5">
      {part.differs ? <AgreementSign agrees={false} /> : <span className="inline-block w-4" />}
      <span className="inline-grid gap-y-0.5">
        {rows.map((values, row) => (
          <span key={values[0]?.label ?? row} className="flex justify-end gap-x-3">
            {values.map((value) => (
              <span
                key={value.label}
                className={
                  part.columns === 2 ? 'inline-block w-26 text-right' : 'inline-block w-13 text-right'
                }
              >
                <WrittenText value={value} sign={false} />
                <span className="sr-only">, </span>
              </span>
            ))}
          </span>
        ))}
      </span>
    </span>
  );
}
