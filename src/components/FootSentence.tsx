import { type ReactNode, useEffect, useRef, useState } from 'react';

const shownMs = 10_000;

/** A sentence at the foot of the window, for ten seconds and for as long as someone is on it. */
export function FootSentence({
  sentence,
  onGone,
  children,
}: {
  readonly sentence: string;
  /** The ten seconds are over. */
  readonly onGone: () => void;
  /** A way on or back, beside it. */
  readonly children?: ReactNode;
}) {
  const [held, setHeld] = useState(false);
  const gone = useRef(onGone);
  useEffect(() => {
    gone.current = onGone;
  });
  useEffect(() => {
    if (held) return;
    const timer = window.setTimeout(() => {
      gone.current();
    }, shownMs);
    return () => {
      window.clearTimeout(timer);
    };
  }, [held, sentence]);
  const hold = (): void => {
    setHeld(true);
  };
  const letGo = (): void => {
    setHeld(false);
  };
  return (
    <div
      className="flex flex-wrap gap-x-4 border-t-[1.5px] border-ink bg-paper px-5 py-3 sm:px-10"
      onPointerEnter={hold}
      onPointerLeave={letGo}
      onFocus={hold}
      onBlur={letGo}
    >
      <span>{sentence}</span>
      {children}
    </div>
  );
}
