import { useEffect, useRef, useState } from 'react';
import { TextButton } from './TextLink';
import { isTyping } from './use-go-keys';

interface UndoSentenceProps {
  /** What was done: "Row 4 taken out." */
  readonly sentence: string;
  readonly onUndo: () => void;
  /** The ten seconds are over, or it was undone. */
  readonly onGone: () => void;
}

const shownMs = 10_000;

/** A sentence at the foot with the way back, for ten seconds and for as long as someone is on it. */
export function UndoSentence({ sentence, onUndo, onGone }: UndoSentenceProps) {
  const [held, setHeld] = useState(false);
  const latest = useRef({ onUndo, onGone });
  useEffect(() => {
    latest.current = { onUndo, onGone };
  });

  useEffect(() => {
    if (held) return;
    const timer = window.setTimeout(() => {
      latest.current.onGone();
    }, shownMs);
    return () => {
      window.clearTimeout(timer);
    };
  }, [held, sentence]);

  useEffect(() => {
    const press = (event: KeyboardEvent): void => {
      if (event.key !== 'z' || !(event.ctrlKey || event.metaKey) || event.shiftKey) return;
      // In a field Ctrl+Z takes back what was typed there.
      if (isTyping(event.target) || event.defaultPrevented) return;
      event.preventDefault();
      latest.current.onUndo();
      latest.current.onGone();
    };
    window.addEventListener('keydown', press);
    return () => {
      window.removeEventListener('keydown', press);
    };
  }, []);

  const hold = (): void => {
    setHeld(true);
  };
  const letGo = (): void => {
    setHeld(false);
  };
  return (
    <div
      role="status"
      className="fixed inset-x-0 bottom-0 z-30 flex flex-wrap gap-x-4 border-t-[1.5px] border-ink bg-paper px-5 py-3 sm:px-10"
      onPointerEnter={hold}
      onPointerLeave={letGo}
      onFocus={hold}
      onBlur={letGo}
    >
      <span>{sentence}</span>
      <TextButton
        aria-keyshortcuts="Control+Z"
        onClick={() => {
          onUndo();
          onGone();
        }}
      >
        Undo
      </TextButton>
    </div>
  );
}
