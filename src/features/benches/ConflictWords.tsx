import type { ReactNode } from 'react';
import { classNames } from '../../components/class-names';

/** One sentence against a plate. A fault has a shape and a weight of its own, so that it is one without its colour. */
export function ConflictWords(props: { readonly kind: 'fault' | 'warning'; readonly children: ReactNode }) {
  const { kind, children } = props;
  return (
    <p className={classNames('bench-conflict', kind === 'fault' && 'text-fault font-strong')}>
      <ConflictSign kind={kind} />
      <span>
        <span className="sr-only">{kind === 'fault' ? 'At fault: ' : 'To know: '}</span>
        {children}
      </span>
    </p>
  );
}

/** A cross for what is refused, a line that stands off its place for what is to be known. */
function ConflictSign({ kind }: { readonly kind: 'fault' | 'warning' }) {
  return (
    <svg aria-hidden="true" viewBox="-7 -7 14 14" width="14" height="14" className="mt-1 shrink-0">
      {kind === 'fault' ? (
        <path d="M-5 -5L5 5M-5 5L5 -5" className="stroke-fault" strokeWidth="2.2" />
      ) : (
        <path d="M-6 3H6M0 -6V0" className="stroke-ink" strokeWidth="1.6" />
      )}
    </svg>
  );
}
