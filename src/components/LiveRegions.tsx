import { useEffect } from 'react';
import { FootSentence } from './FootSentence';
import { sayDone, useLiveRegion } from './live-region-store';

/** The places that are read out when they change. Once per page, from the start: a region that comes with its text is silent. */
export function LiveRegions() {
  const polite = useLiveRegion((state) => state.polite);
  const assertive = useLiveRegion((state) => state.assertive);
  const done = useLiveRegion((state) => state.done);
  const stand = useLiveRegion((state) => state.stand);
  // Of another page nothing was just done.
  useEffect(() => () => sayDone(''), []);
  return (
    <>
      <div className="sr-only">
        <div role="status" aria-live="polite">
          <span key={polite.count}>{polite.text}</span>
        </div>
        <div role="alert" aria-live="assertive">
          <span key={assertive.count}>{assertive.text}</span>
        </div>
      </div>
      <div ref={stand} role="status" aria-live="polite" className="fixed inset-x-0 bottom-0 z-30">
        {done.text !== '' && (
          <FootSentence key={done.count} sentence={done.text} onGone={() => sayDone('')} />
        )}
      </div>
    </>
  );
}
