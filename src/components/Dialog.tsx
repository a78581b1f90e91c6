import { classNames } from './class-names';
import { type ReactNode, useEffect, useId, useLayoutEffect, useRef } from 'react';

interface DialogProps {
  readonly open: boolean;
  /** The title is the question: "Release version 15?" */
  readonly question: ReactNode;
  /** The consequences, with numbers. */
  readonly children: ReactNode;
  /** For what has a picture beside its fields. */
  readonly wide?: boolean;
  /** Buttons that are verbs; the way back among them. */
  readonly actions: ReactNode;
  /** Esc, and whatever closes it. Never the verb. */
  readonly onClose: () => void;
}

/**
 * For what can't be undone. The browser's own dialog: it keeps the focus inside and everything behind it out of reach, and the
 * focus goes back to where it was. The question gets the focus first, so that no key in flight presses a verb.
 */
export function Dialog({ open, question, wide = false, children, actions, onClose }: DialogProps) {
  const dialog = useRef<HTMLDialogElement>(null);
  const head = useRef<HTMLHeadingElement>(null);
  const titleId = useId();
  const close = useRef(onClose);
  useEffect(() => {
    close.current = onClose;
  });

  // A layout effect, since on unmounting the dialog has to be closed while it is still in the page.
  useLayoutEffect(() => {
    const element = dialog.current;
    if (!open || element === null) return;
    const before = document.activeElement;
    element.showModal();
    head.current?.focus();
    return () => {
      element.close();
      if (before instanceof HTMLElement && before.isConnected) before.focus();
    };
  }, [open]);

  if (!open) return null;
  return (
    <dialog
      ref={dialog}
      aria-labelledby={titleId}
      onCancel={(event) => {
        event.preventDefault();
        close.current();
      }}
      className={classNames(
        wide ? 'max-w-240' : 'max-w-140',
        'm-auto w-full border-[1.5px] border-ink bg-paper p-6 text-body text-ink max-sm:max-w-[calc(100%-2.5rem)]',
      )}
    >
      <h2 id={titleId} ref={head} tabIndex={-1} className="text-section">
        {question}
      </h2>
      <div className="mt-3 space-y-3">{children}</div>
      <div className="mt-6 flex flex-wrap gap-4">{actions}</div>
    </dialog>
  );
}
