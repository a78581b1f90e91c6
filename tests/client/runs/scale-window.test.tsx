// @vitest-environment jsdom
import { cleanup, render } from '@testing-library/react';
import { afterEach, describe, expect, test } from 'vitest';
import { ScaleWindow } from '../../../src/components/ScaleWindow';

afterEach(cleanup);

const scale = { direction: 1, resolutionDeg: 0.1 } as const;
/** The heights that the index line covers, from the top. */
function indexLine(readingDeg: number): [from: number, to: number][] {
  const { container } = render(<ScaleWindow readingDeg={readingDeg} scale={scale} />);
  const drawn = container.querySelector('path.stroke-act')?.getAttribute('d') ?? '';
  return [...drawn.matchAll(/M420 (\d+)V(\d+)/gu)].map(([, from, to]) => [Number(from), Number(to)]);
}
/** A number 19 px high stands on this line. */
const [numberTop, numberFoot] = [47, 62];
const strikes = ([from, to]: [number, number]): boolean => from < numberFoot && to > numberTop;

describe('the index line of a scale window', () => {
  test.each([0, 45, 45.3, 180, 359.8])('leaves the engraved number at %s readable', (readingDeg) => {
    const line = indexLine(readingDeg);
    expect(line.length).toBeGreaterThan(0);
    expect(line.filter(strikes)).toEqual([]);
  });

  test('is whole where no number stands under it', () => {
    expect(indexLine(42.4)).toEqual([[20, 97]]);
  });
});
