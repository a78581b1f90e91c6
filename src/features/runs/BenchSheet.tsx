import { type KeyboardEvent, type ReactNode, useEffect, useId, useRef } from 'react';

interface BenchSheetProps {
  readonly title: ReactNode;
  readonly onClose: () => void;
  /** Covers the whole bench; otherwise it stands at the foot and the numerals stay in view. */
  readonly tall?: boolean;
  readonly children: ReactNode;
}

/** A sheet over the foot of the bench. What is behind it is inert; Esc closes it and changes nothing. */
export function BenchSheet({ title, onClose, tall = false, children }: BenchSheetProps) {
  const titleId = useId();
  const root = useRef<HTMLElement>(null);
  useEffect(() => {
    const before = document.activeElement;
    const first = root.current?.querySelector<HTMLElement>('[data-first], input:not([type=radio]), textarea');
    (first ?? root.current)?.focus();
    return () => {
      if (before instanceof HTMLElement && before.isConnected) before.focus();
    };
  }, []);
  const onKeyDown = (event: KeyboardEvent): void => {
    if (event.key !== 'Escape') return;
    event.stopPropagation();
    onClose();
  };
  return (
    <section
      ref={root}
      role="dialog"
      aria-modal="true"
      aria-labelledby={titleId}
      tabIndex={-1}
      onKeyDown={onKeyDown}
      className={tall ? 'bench-sheet bench-sheet-tall' : 'bench-sheet'}
    >
      <h2 id={titleId} className="bench-sheet-title">
        {title}
      </h2>
      {children}
    </section>
  );
}
