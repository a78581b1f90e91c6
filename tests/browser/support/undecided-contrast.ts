/** One text that axe left undecided, with its worst contrast on any ground of its theme. */
export interface MeasuredText {
  readonly selector: string;
  readonly ratio: number;
}

/**
 * axe takes every `svg` for a picture and leaves the text in it undecided; so it does with KaTeX's root signs. This decides them:
 * the text's own computed colour against `paper`, `glass` and `wash` of the theme it stands in, or against `lit` for text that is
 * painted to stand on it. Self-contained, so that a browser test can hand it to `page.evaluate`.
 */
export function measureUndecided(selectors: readonly string[]): readonly MeasuredText[] {
  const channels = (colour: string): readonly number[] => {
    const text = colour.trim();
    if (text.startsWith('#')) return [1, 3, 5].map((at) => Number.parseInt(text.slice(at, at + 2), 16));
    return (text.match(/\d+(?:\.\d+)?/g) ?? []).slice(0, 3).map(Number);
  };
  const luminance = (colour: string): number => {
    const [red = 0, green = 0, blue = 0] = channels(colour)
      .map((value) => value / 255)
      .map((value) => (value <= 0.04045 ? value / 12.92 : ((value + 0.055) / 1.055) ** 2.4));
    return 0.2126 * red + 0.7152 * green + 0.0722 * blue;
  };
  const ratio = (first: string, second: string): number => {
    const [dark = 0, light = 0] = [luminance(first), luminance(second)].sort((a, b) => a - b);
    return (light + 0.05) / (dark + 0.05);
  };
  return selectors.map((selector) => {
    const element = document.querySelector(selector);
    if (element === null) return { selector, ratio: 0 };
    const style = getComputedStyle(element);
    const colour = element instanceof SVGElement ? style.fill : style.color;
    // Not painted at all, such as the text that only carries the marks under a field: there is nothing to read.
    if (/^rgba\(.*, 0\)$/.test(colour)) return { selector, ratio: Infinity };
    const token = (name: string): string => style.getPropertyValue(name);
    const onLit = channels(colour).join() === channels(token('--on-lit')).join();
    const lit = onLit && element.closest('svg')?.querySelector('.fill-lit') !== null;
    const grounds = lit ? ['--lit'] : ['--paper', '--glass', '--wash'];
    return { selector, ratio: Math.min(...grounds.map((ground) => ratio(colour, token(ground)))) };
  });
}
