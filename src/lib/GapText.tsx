import { Fragment } from 'react';
import { thinGap } from './format';

/** A sentence with U+202F in it, each drawn as a margin: the faces have no such character. */
export function GapText({ text }: { readonly text: string }) {
  return text.split(thinGap).map((part, index) =>
    index === 0 ? (
      <Fragment key="first">{part}</Fragment>
    ) : (
      <span key={`${index} ${part}`} className="gap-before">
        {part}
      </span>
    ),
  );
}
