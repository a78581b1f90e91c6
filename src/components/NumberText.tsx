import { type ClipboardEvent, Fragment } from 'react';
import { thinGap, toPlainAscii } from '../lib/format/signs';
import { classNames } from './class-names';

/** Puts plain ASCII on the clipboard when what is copied lies inside this one number. */
function copyAs(plain: string) {
  return (event: ClipboardEvent<HTMLElement>): void => {
    const selection = document.getSelection();
    if (selection === null || selection.rangeCount === 0) return;
    const { commonAncestorContainer } = selection.getRangeAt(0);
    if (!event.currentTarget.contains(commonAncestorContainer)) return;
    event.clipboardData.setData('text/plain', plain);
    event.preventDefault();
  };
}

interface NumberTextProps {
  /** As the formatters write it, with U+202F between groups. */
  readonly text: string;
  /** What it is copied as; plain ASCII of the text unless given. */
  readonly plain?: string | undefined;
  /** Numbers inside a sentence stay in the text face. */
  readonly mono?: boolean;
  readonly className?: string | undefined;
}

/** A number on one line, its groups apart by a margin, since the faces have no thin gap. */
export function NumberText({ text, plain = toPlainAscii(text), mono = true, className }: NumberTextProps) {
  return (
    <span className={classNames('whitespace-nowrap', mono && 'font-mono', className)} onCopy={copyAs(plain)}>
      {text.split(thinGap).map((group, index) =>
        index === 0 ? (
          <Fragment key="first">{group}</Fragment>
        ) : (
          <span key={`${index}-${group}`} className="gap-before">
            {group}
          </span>
        ),
      )}
    </span>
  );
}

interface QuantityProps extends NumberTextProps {
  /** `nm`, `s`, `%`; a degree sign belongs to the text, closed up. */
  readonly unit: string;
}

/** A number with its unit, a thin gap between. */
export function Quantity({ unit, ...number }: QuantityProps) {
  return (
    <span className="whitespace-nowrap">
      <NumberText mono={false} {...number} />
      <span className="gap-before">{unit}</span>
    </span>
  );
}

interface ScientificTextProps {
  readonly mantissa: string;
  readonly exponent: number | null;
  readonly mono?: boolean;
  readonly className?: string | undefined;
}

/** `2.5 × 10⁻⁵`: the exponent raised by `<sup>`, thin gaps around the sign, and one sentence for a screen reader. */
export function ScientificText({ mantissa, exponent, mono = true, className }: ScientificTextProps) {
  if (exponent === null) return <NumberText text={mantissa} mono={mono} className={className} />;
  const power = String(exponent).replace('-', '\u2212');
  return (
    <span
      className={classNames('whitespace-nowrap', className)}
      onCopy={copyAs(`${toPlainAscii(mantissa)}e${exponent}`)}
    >
      <span aria-hidden="true">
        <span className={mono ? 'font-mono' : undefined}>{mantissa}</span>
        <span className="mx-[0.17em]">×</span>
        <span>10</span>
        <sup>{power}</sup>
      </span>
      <span className="sr-only select-none">
        {mantissa} times ten to the {power}
      </span>
    </span>
  );
}
