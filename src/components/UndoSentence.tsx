import { useEffect, useRef } from 'react';
import { createPortal } from 'react-dom';
import { FootSentence } from './FootSentence';
import { useLiveRegion } from './live-region-store';
import { TextButton } from './TextLink';
import { isTyping } from './use-go-keys';

interface UndoSentenceProps {
  /** What was done: "Row 4 taken out." */
  readonly sentence: string;
  readonly onUndo: () => void;
  /** The ten seconds are over, or it was undone. */
  readonly onGone: () => void;
}

/** A sentence at the foot with the way back, for ten seconds and for as long as someone is on it. */
export function UndoSentence({ sentence, onUndo, onGone }: UndoSentenceProps) {
  const foot = useLiveRegion((state) => state.foot);
  const latest = useRef({ onUndo, onGone });
  useEffect(() => {
    latest.current = { onUndo, onGone };
  });

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

  const said = (
    <FootSentence sentence={sentence} onGone={onGone}>
      <TextButton
        aria-keyshortcuts="Control+Z"
        onClick={() => {
          onUndo();
          onGone();
        }}
      >
        Undo
      </TextButton>
    </FootSentence>
  );
  // Beside what was just done, and never over it.
  return foot === null ? (
    <div className="fixed inset-x-0 bottom-0 z-30">{said}</div>
  ) : (
    createPortal(said, foot)
  );
}
