import { useEffect, useRef } from 'react';
import { Button } from './Button';

interface ShowMoreProps {
  /** What comes: "plates". */
  readonly what: string;
  readonly hasMore: boolean;
  readonly isFetching: boolean;
  readonly onMore: () => void;
}

/** How far below the window the next page is asked for, so that it is there when the person is. */
const ahead = '600px';

/** The end of a list that comes page by page: scrolling to it brings the next page, and so does its button. */
export function ShowMore({ what, hasMore, isFetching, onMore }: ShowMoreProps) {
  const end = useRef<HTMLDivElement>(null);
  const more = useRef(onMore);
  useEffect(() => {
    more.current = onMore;
  });
  useEffect(() => {
    const element = end.current;
    if (element === null || !hasMore || isFetching || typeof IntersectionObserver === 'undefined') return;
    const observer = new IntersectionObserver(
      (entries) => {
        if (entries.some(({ isIntersecting }) => isIntersecting)) more.current();
      },
      { rootMargin: ahead },
    );
    observer.observe(element);
    return () => observer.disconnect();
  }, [hasMore, isFetching]);
  return (
    <div ref={end} className={hasMore ? 'mt-4' : undefined}>
      {hasMore && (
        <Button onClick={onMore} waitsFor={isFetching ? `the next ${what}` : undefined}>
          Show more {what}
        </Button>
      )}
    </div>
  );
}
