import { useEffect } from 'react';
import { type BlockerFunction, useBlocker } from 'react-router-dom';

/**
 * Leaving a page that holds something asks once: by a link or Back here, by closing the window in the browser's own words.
 * @param isHeld whether there is anything to ask about.
 * @param isAway whether a way leads out of it; asked as it is taken.
 */
export function useLeaveAsked(isHeld: boolean, isAway: BlockerFunction) {
  const blocker = useBlocker((way) => isHeld && isAway(way));
  useEffect(() => {
    if (!isHeld) return undefined;
    const ask = (event: BeforeUnloadEvent): void => event.preventDefault();
    window.addEventListener('beforeunload', ask);
    return () => window.removeEventListener('beforeunload', ask);
  }, [isHeld]);
  return {
    isAsked: blocker.state === 'blocked',
    stay: () => blocker.reset?.(),
    leave: () => blocker.proceed?.(),
  };
}
