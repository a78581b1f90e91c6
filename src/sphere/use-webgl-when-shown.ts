import { type RefObject, useEffect, useState } from 'react';
import { probeWebGl, type WebGlSupport } from './webgl';

/** Asks for WebGL once the element has come onto the screen; 'none' until then, so that nothing of 3D is loaded unseen. */
export function useWebGlWhenShown(element: RefObject<HTMLElement | null>): WebGlSupport {
  const [support, setSupport] = useState<WebGlSupport>('none');
  useEffect(() => {
    const box = element.current;
    // Where it can't be told whether it is on the screen, the SVG does.
    if (box === null || !('IntersectionObserver' in window)) return undefined;
    const seen = new IntersectionObserver((entries) => {
      if (!entries.some(({ isIntersecting }) => isIntersecting)) return;
      seen.disconnect();
      setSupport(probeWebGl());
    });
    seen.observe(box);
    return () => seen.disconnect();
  }, [element]);
  return support;
}
