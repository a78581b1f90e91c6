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
    'ink-3': read('ink-3'),
    rule: read('rule'),
    beam: read('beam'),
  };
}

/** Calls back when a theme or the lamp is set on the element or on anything around it. Returns how to stop. */
export function watchTheme(element: Element, update: () => void): () => void {
  const observer = new MutationObserver(update);
  for (let node: Element | null = element; node !== null; node = node.parentElement) {
    observer.observe(node, { attributeFilter: ['data-theme', 'data-lamp', 'data-lamp-ink', 'class'] });
  }
  if (typeof window.matchMedia !== 'function') return () => observer.disconnect();
  const scheme = window.matchMedia('(prefers-color-scheme: dark)');
  scheme.addEventListener('change', update);
  return () => {
    observer.disconnect();
    scheme.removeEventListener('change', update);
  };
}

/** The colours where `element` stands, read again when the theme changes. */
export function usePalette(element: Element | null): Palette | undefined {
  const [palette, setPalette] = useState<Palette>();
  useEffect(() => {
    if (element === null) return undefined;
    const update = () => setPalette(readPalette(element));
    update();
    return watchTheme(element, update);
  }, [element]);
  return palette;
}
