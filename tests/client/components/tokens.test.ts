// @vitest-environment node
import { readFileSync } from 'node:fs';
import { describe, expect, it } from 'vitest';

const css = readFileSync(new URL('../../../src/styles/tokens.css', import.meta.url), 'utf8');

/** The tokens that a block of the style sheet sets, by its selector. */
function block(selector: string): Map<string, string> {
  const start = css.indexOf(`${selector} {`);
  expect(start).toBeGreaterThanOrEqual(0);
  const body = css.slice(start, css.indexOf('}', start));
  return new Map(
    [...body.matchAll(/--([\w-]+):([^;]+);/g)].map(([, name = '', value = '']) => [name, value.trim()]),
  );
}

function luminance(hex: string): number {
  const [red = 0, green = 0, blue = 0] = [1, 3, 5]
    .map((at) => Number.parseInt(hex.slice(at, at + 2), 16) / 255)
    .map((value) => (value <= 0.04045 ? value / 12.92 : ((value + 0.055) / 1.055) ** 2.4));
  return 0.2126 * red + 0.7152 * green + 0.0722 * blue;
}

/** WCAG 2.2, relative luminance with the sRGB threshold of 0.04045. */
function ratio(first: string, second: string): number {
  const [dark = 0, light = 0] = [luminance(first), luminance(second)].sort((a, b) => a - b);
  return (light + 0.05) / (dark + 0.05);
}

const themes = {
  day: block("[data-theme='day']"),
  evening: block("[data-theme='evening']"),
  dark: block("[data-theme='dark-room']"),
};
const hex = (theme: keyof typeof themes, name: string): string => {
  const value = themes[theme].get(name) ?? '';
  const alias = /^var\(--([\w-]+)\)$/.exec(value)?.[1];
  return alias === undefined ? value : hex(theme, alias);
};

describe('contrast of the tokens', () => {
  // The figures of the look's token table, on paper.
  it.each([
    ['day', 'ink', 15.7],
    ['day', 'ink-2', 8.1],
    ['day', 'ink-3', 5.4],
    ['day', 'rule', 3.6],
    ['day', 'hair', 1.5],
    ['day', 'beam', 4.1],
    ['day', 'beam-text', 6.3],
    ['day', 'fault', 6.0],
    ['day', 'hv', 8.8],
    ['day', 'da', 3.4],
    ['day', 'rl', 4.5],
    ['evening', 'ink', 14.6],
    ['evening', 'ink-2', 9.3],
    ['evening', 'ink-3', 6.3],
    ['evening', 'rule', 4.3],
    ['evening', 'beam', 7.1],
    ['evening', 'beam-text', 9.3],
    ['evening', 'fault', 7.8],
    ['evening', 'hv', 8.3],
    ['evening', 'da', 6.6],
    ['evening', 'rl', 6.1],
    ['dark', 'act', 7.7],
    ['dark', 'ink', 6.0],
    ['dark', 'ink-2', 5.2],
    ['dark', 'ink-3', 4.8],
    ['dark', 'rule', 3.2],
    ['dark', 'hair', 1.5],
  ] as const)('%s %s is %f on paper', (theme, name, expected) => {
    expect(ratio(hex(theme, name), hex(theme, 'paper'))).toBeGreaterThan(expected - 0.06);
    expect(ratio(hex(theme, name), hex(theme, 'paper'))).toBeLessThan(expected + 0.1);
  });

  it.each(['day', 'evening', 'dark'] as const)(
    'text in %s reaches 4.5 on paper, glass and wash, lines 3',
    (theme) => {
      for (const ground of ['paper', 'glass', 'wash']) {
        for (const text of ['ink', 'ink-2', 'ink-3', 'beam-text', 'fault']) {
          expect(ratio(hex(theme, text), hex(theme, ground)), `${text} on ${ground}`).toBeGreaterThanOrEqual(
            4.5,
          );
        }
        for (const line of ['rule', 'beam', 'hv', 'da', 'rl']) {
          expect(ratio(hex(theme, line), hex(theme, ground)), `${line} on ${ground}`).toBeGreaterThanOrEqual(
            3,
          );
        }
      }
      expect(ratio(hex(theme, 'on-lit'), hex(theme, 'lit'))).toBeGreaterThanOrEqual(4.5);
      expect(ratio(hex(theme, 'paper'), hex(theme, 'ink'))).toBeGreaterThanOrEqual(4.5);
    },
  );

  it.each([
    ["[data-theme='dark-room'][data-lamp='low']", 0.6],
    ["[data-theme='dark-room'][data-lamp='high']", 1.4],
  ] as const)('%s keeps the hue at its share of the luminance', (selector, share) => {
    const lamp = block(selector);
    for (const [name, value] of lamp) {
      expect(luminance(value) / luminance(hex('dark', name)), name).toBeCloseTo(share, 1);
    }
  });

  it('has no blue to speak of in the dark room, and red ink has neither green nor blue', () => {
    for (const selector of ["[data-theme='dark-room']", "[data-theme='dark-room'][data-lamp='high']"]) {
      for (const [name, value] of block(selector)) {
        if (/^#[0-9a-f]{6}$/.test(value))
          expect(Number.parseInt(value.slice(5), 16), name).toBeLessThanOrEqual(0x18);
      }
    }
    const red = block("[data-theme='dark-room'][data-lamp-ink='red']");
    for (const [name, value] of red)
      if (value.startsWith('#')) expect(value, name).toMatch(/^#[0-9a-f]{2}0000$/);
    for (const text of ['act', 'ink', 'ink-2', 'ink-3']) {
      expect(ratio(red.get(text) ?? '', red.get('paper') ?? '')).toBeGreaterThanOrEqual(4.5);
    }
  });
});
