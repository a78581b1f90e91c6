import { useState } from 'react';
import { completionsAt, type VocabularyEntry } from '../../../../shared/optics/expression/vocabulary';

/** What may stand at the cursor, and which of it the arrow keys are on. */
export interface Completion {
  readonly entries: readonly VocabularyEntry[];
  /** Place of the entry that Enter would put in; -1 while nobody has moved to one. */
  readonly active: number;
  /** After every key and click: looks again at where the cursor stands. */
  readonly look: (value: string, cursor: number, asked: boolean) => void;
  readonly move: (by: 1 | -1) => void;
  readonly close: () => void;
  /** The text with the entry put in, and where the cursor then stands. */
  readonly complete: (
    value: string,
    entry: VocabularyEntry,
  ) => { readonly value: string; readonly cursor: number };
}

/** More than this is no help, but a list to read. */
const mostEntries = 6;

interface Offer {
  readonly from: number;
  readonly to: number;
  readonly entries: readonly VocabularyEntry[];
  readonly active: number;
}

const nothing: Offer = { from: 0, to: 0, entries: [], active: -1 };

/** Offers what completes the word at the cursor; unasked only once a word has begun and isn't whole. */
export function useCompletion(mode: 'state' | 'unitary'): Completion {
  const [offer, setOffer] = useState(nothing);
  return {
    entries: offer.entries,
    active: offer.active,
    look: (value, cursor, asked) => {
      const { from, to, entries } = completionsAt(value, cursor + 1, mode);
      const begun = value.slice(from, to);
      const whole = entries.some(({ insert }) => insert === begun);
      const wanted = asked || (begun.length > 1 && !whole);
      setOffer(
        wanted ? { from, to, entries: entries.slice(0, mostEntries), active: asked ? 0 : -1 } : nothing,
      );
    },
    move: (by) =>
      setOffer((now) => {
        const count = now.entries.length;
        const next = now.active < 0 ? (by === 1 ? 0 : count - 1) : (now.active + by + count) % count;
        return count === 0 ? now : { ...now, active: next };
      }),
    close: () => setOffer(nothing),
    complete: (value, { insert }) => {
      setOffer(nothing);
      return {
        value: value.slice(0, offer.from) + insert + value.slice(offer.to),
        cursor: offer.from + insert.length,
      };
    },
  };
}
