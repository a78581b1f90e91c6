import { useEffect, useRef } from 'react';

/** Nothing but dark, for a detector that sees every screen, until a key or a touch. */
export function BlankScreen({ onWake }: { readonly onWake: () => void }) {
  const root = useRef<HTMLButtonElement>(null);
  useEffect(() => {
    root.current?.focus();
  }, []);
  return (
    <button
      ref={root}
      type="button"
      aria-label="The screen is dark. Press any key to go on."
      className="bench-blank"
      onClick={onWake}
      onKeyDown={(event) => {
        event.preventDefault();
        onWake();
      }}
    />
  );
}
