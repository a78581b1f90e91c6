import { useEffect, useState } from 'react';
import type { SphereToken } from './strokes';

/** The theme's colours as `#rrggbb`, for what can't read CSS variables itself. */
export type Palette = Readonly<Record<SphereToken, string>>;

function readPalette(element: Element): Palette {
  const style = getComputedStyle(element);
  const read = (token: SphereToken): string => style.getPropertyValue(`--${token}`).trim() || '#000000';
  return {
    paper: read('paper'),
    glass: read('glass'),
    wash: read('wash'),
    ink: read('ink'),
    rule: read('rule'),
    beam: read('beam'),
  };
}

/** The colours where `element` stands, read again when a theme or the lamp is set on it or on anything around it. */
export function usePalette(element: Element | null): Palette | undefined {
  const [palette, setPalette] = useState<Palette>();
  useEffect(() => {
    if (element === null) return undefined;
    const update = () => setPalette(readPalette(element));
    update();
    const observer = new MutationObserver(update);
    for (let node: Element | null = element; node !== null; node = node.parentElement) {
      observer.observe(node, { attributeFilter: ['data-theme', 'data-lamp', 'data-lamp-ink', 'class'] });
    }
    const scheme = window.matchMedia('(prefers-color-scheme: dark)');
    scheme.addEventListener('change', update);
    return () => {
      observer.disconnect();
      scheme.removeEventListener('change', update);
    };
  }, [element]);
  return palette;
}
