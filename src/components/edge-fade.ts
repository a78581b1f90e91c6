/** Less than this out of sight, in px, is a rounding of widths. */
const seenPx = 2;

/**
 * A ref for what scrolls sideways: where it goes on out of sight, that edge fades out (`data-more-left` and `data-more-right` in base.css). Written to the
 * element itself, so that scrolling draws nothing anew.
 */
export function edgeFade(element: HTMLElement | null): (() => void) | undefined {
  if (element === null) return undefined;
  const look = () => {
    const { scrollLeft, clientWidth, scrollWidth } = element;
    element.toggleAttribute('data-more-left', scrollLeft > seenPx);
    element.toggleAttribute('data-more-right', scrollLeft + clientWidth < scrollWidth - seenPx);
  };
  element.addEventListener('scroll', look, { passive: true });
  const observer = typeof ResizeObserver === 'undefined' ? null : new ResizeObserver(look);
  observer?.observe(element);
  // What is in it may grow while its own width stays.
  for (const child of element.children) observer?.observe(child);
  return () => {
    element.removeEventListener('scroll', look);
    observer?.disconnect();
    element.removeAttribute('data-more-left');
    element.removeAttribute('data-more-right');
  };
}
