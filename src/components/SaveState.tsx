import { daysBetween, formatMoment, formatTimeExact } from '../lib/format/date';

/** The three honest words of saving. */
export type Saving =
  | { readonly kind: 'typed' }
  | { readonly kind: 'kept'; readonly waiting?: number | undefined }
  | { readonly kind: 'saved'; readonly at: Date };

/** `typed`, `kept on this device`, `three readings wait on this device`, `saved 10:42:07`, `saved yesterday 17:20`. */
export function savingWords(saving: Saving, one = 'change', many = 'changes', now = new Date()): string {
  switch (saving.kind) {
    case 'typed':
      return 'typed';
    case 'kept': {
      const { waiting } = saving;
      if (waiting === undefined || waiting === 0) return 'kept on this device';
      return waiting === 1 ? `1 ${one} waits on this device` : `${waiting} ${many} wait on this device`;
    }
    case 'saved':
      return `saved ${daysBetween(saving.at, now) === 0 ? formatTimeExact(saving.at) : formatMoment(saving.at, now)}`;
  }
}

interface SaveStateProps {
  readonly saving: Saving;
  /** What waits, in the singular and the plural. */
  readonly one?: string;
  readonly many?: string;
  readonly className?: string | undefined;
}

/** How far what was typed has come. Said politely as it changes. */
export function SaveState({ saving, one, many, className }: SaveStateProps) {
  return (
    <span role="status" aria-live="polite" className={className}>
      {savingWords(saving, one, many)}
    </span>
  );
}
