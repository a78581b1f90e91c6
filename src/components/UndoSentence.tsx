import { useEffect, useRef } from 'react';
import { FootSentence } from './FootSentence';
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

  return (
    <div role="status">
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
    </div>
  );
}
