import { FootSentence } from './FootSentence';
import { sayDone, useLiveRegion } from './live-region-store';

/** The places that are read out when they change. Once per page, from the start: a region that comes with its text is silent. */
export function LiveRegions() {
  const polite = useLiveRegion((state) => state.polite);
  const assertive = useLiveRegion((state) => state.assertive);
  const done = useLiveRegion((state) => state.done);
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
      <div role="status" aria-live="polite">
        {done !== '' && <FootSentence sentence={done} onGone={() => sayDone('')} />}
      </div>
    </>
  );
}
