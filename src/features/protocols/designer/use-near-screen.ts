import { type RefObject, useEffect, useState } from 'react';

/** How far outside the window a row is drawn in full already. */
const margin = '600px 0px';

/** Whether an element is on the screen or soon will be; true where the browser can't tell. */
export function useNearScreen(element: RefObject<Element | null>): boolean {
  const [near, setNear] = useState(typeof IntersectionObserver === 'undefined');
  useEffect(() => {
    if (element.current === null || typeof IntersectionObserver === 'undefined') return;
    const observer = new IntersectionObserver(
      (entries) => setNear(entries.some(({ isIntersecting }) => isIntersecting)),
      { rootMargin: margin },
    );
    observer.observe(element.current);
    return () => observer.disconnect();
  }, [element]);
  return near;
}
