// @vitest-environment jsdom
import { cleanup, render, screen } from '@testing-library/react';
import { userEvent } from '@testing-library/user-event';
import fc from 'fast-check';
import { useState } from 'react';
import { afterEach, describe, expect, it } from 'vitest';
import { fastAxisFromDial } from '../../../shared/optics/dial';
import { degrees, wrap, wrapSigned } from '../../../shared/optics/units';
import { dialWords, seenMove } from '../../../src/components/dial-words';
import { RingDial } from '../../../src/components/RingDial';
import { RingDialControl } from '../../../src/components/RingDialControl';
import { numberAngle, ringTicks, tickStepDeg } from '../../../src/components/ring-geometry';

afterEach(cleanup);

const half = { offsetDeg: 12.4, direction: 1, resolutionDeg: 0.1, rangeDeg: null } as const;
const quarter = { offsetDeg: 301.73, direction: -1, resolutionDeg: 0.1, rangeDeg: null } as const;

/** The signed angle that an SVG arc sweeps, counter-clockwise positive as it is seen, from its own end points and flag. */
function sweepOf(path: string): number {
  const match = /^M([-\d.]+) ([-\d.]+)A[-\d.]+ [-\d.]+ 0 ([01]) ([01]) ([-\d.]+) ([-\d.]+)$/.exec(path);
  const [, x1, y1, large, flag, x2, y2] = match ?? [];
  const angle = (x: string | undefined, y: string | undefined): number =>
    (Math.atan2(-Number(y), Number(x)) * 180) / Math.PI;
  const between = wrap(angle(x2, y2) - angle(x1, y1), 360);
  const sweep = flag === '0' ? between : between - 360;
  expect(Math.abs(sweep) > 180 ? '1' : '0').toBe(large);
  return sweep;
}

describe('a ring that has to be turned', () => {
  it.each([
    [39.9, 83.5, half, 'receiver', 'from 39.9 counter-clockwise by 43.6°, numbers rise'],
    [156.7, 187, quarter, 'receiver', 'from 156.7 clockwise by 30.3°, numbers rise'],
    [156.7, 187, quarter, 'source', 'from 156.7 counter-clockwise by 30.3°, numbers rise'],
    [10, 350, half, 'receiver', 'from 10.0 clockwise by 20.0°, numbers fall'],
    [83.5, 83.5, half, 'receiver', 'stays'],
  ] as const)('from %f to %f says what it draws', (from, to, scale, viewedFrom, sentence) => {
    expect(dialWords(from, to, scale, viewedFrom).sentence).toBe(sentence);
  });

  it('draws the arc the way its words say, for any mount and either side', () => {
    const reading = fc.integer({ min: 0, max: 3599 }).map((tenths) => tenths / 10);
    fc.assert(
      fc.property(
        reading,
        reading,
        fc.constantFrom(half, quarter),
        fc.constantFrom('receiver' as const, 'source' as const),
        (from, to, scale, viewedFrom) => {
          const words = dialWords(from, to, scale, viewedFrom);
          const { turnDeg } = seenMove(from, to, scale.direction, viewedFrom);
          fc.pre(Math.abs(turnDeg) > 25);
          const { container } = render(
            <RingDial
              radius={54}
              kind="half"
              scale={scale}
              readingDeg={from}
              toDeg={to}
              viewedFrom={viewedFrom}
            />,
          );
          const drawn = [...container.querySelectorAll('[data-sweep] path')]
            .map((path) => path.getAttribute('d') ?? '')
            .find((path) => path.includes('A'));
          const sweep = sweepOf(drawn ?? '');
          expect(Math.sign(sweep)).toBe(words.sense === 'counter-clockwise' ? 1 : -1);
          // The bead's and the head's own sizes are taken off the arc.
          expect(Math.abs(turnDeg) - Math.abs(sweep)).toBeLessThan(20);
          // The bead stands on the wanted mark, and the turn brings that mark under the index at the top.
          const bead = numberAngle(to, from, scale, 90, viewedFrom);
          expect(wrapSigned(bead + turnDeg - 90, 360)).toBeCloseTo(0, 6);
          cleanup();
        },
      ),
      { numRuns: 60 },
    );
  });
});

describe('the engraving', () => {
  it('has the present reading under the index, for mounts that run either way', () => {
    for (const scale of [half, quarter]) expect(numberAngle(187, 187, scale, 90, 'receiver')).toBe(90);
    // Numbers that rise when the mount turns counter-clockwise lie clockwise of the index, as on the mount.
    expect(numberAngle(90, 83.5, half, 90, 'receiver')).toBeCloseTo(83.5);
    expect(numberAngle(190, 187, quarter, 90, 'receiver')).toBeCloseTo(93);
  });

  it('thins out with size and never loses the thirties', () => {
    expect([130, 100, 54, 40, 20].map(tickStepDeg)).toEqual([1, 2, 5, 10, 15]);
    for (const step of [1, 2, 5, 10, 15]) {
      expect(ringTicks(step).filter(({ rank }) => rank === 'long')).toHaveLength(12);
    }
  });
});

function Held({ from }: { readonly from: number }) {
  const [reading, setReading] = useState(from);
  return (
    <RingDialControl
      name="Q-B"
      radius={92}
      kind="quarter"
      scale={quarter}
      readingDeg={reading}
      onChange={setReading}
    />
  );
}

describe('a ring as a control', () => {
  it('is named by plate, reading and fast axis', () => {
    render(<Held from={187} />);
    const axis = fastAxisFromDial(degrees(187), quarter).toFixed(1);
    expect(axis).toBe('114.7');
    expect(screen.getByRole('slider', { name: 'Q-B dial, 187.0 degrees, fast axis at 114.7' })).toBeTruthy();
  });

  it('turns by keys: 0.1, with Shift 1, by Page 10', async () => {
    const user = userEvent.setup();
    render(<Held from={187} />);
    const slider = screen.getByRole('slider');
    slider.focus();
    await user.keyboard('{ArrowUp}');
    expect(slider.getAttribute('aria-valuetext')).toBe('187.1 degrees');
    await user.keyboard('{Shift>}{ArrowLeft}{/Shift}');
    expect(slider.getAttribute('aria-valuetext')).toBe('186.1 degrees');
    await user.keyboard('{PageUp}{PageUp}');
    expect(slider.getAttribute('aria-valuetext')).toBe('206.1 degrees');
  });

  it('passes through 0 without stopping', async () => {
    const user = userEvent.setup();
    render(<Held from={0} />);
    screen.getByRole('slider').focus();
    await user.keyboard('{ArrowDown}');
    expect(screen.getByRole('slider').getAttribute('aria-valuenow')).toBe('359.9');
  });

  it('turns by its buttons and by a written number, and says what is wrong with another', async () => {
    const user = userEvent.setup();
    render(<Held from={187} />);
    await user.click(screen.getByRole('button', { name: 'Q-B dial 0.1° less' }));
    expect(screen.getByRole('slider').getAttribute('aria-valuenow')).toBe('186.9');
    const field = screen.getByRole('textbox', { name: 'Q-B dial, degrees' });
    await user.clear(field);
    await user.type(field, '83.5');
    expect(screen.getByRole('slider').getAttribute('aria-valuenow')).toBe('83.5');
    await user.type(field, 'x');
    expect(field.getAttribute('aria-invalid')).toBe('true');
    expect(screen.getByRole('slider').getAttribute('aria-valuenow')).toBe('83.5');
  });

  it.each([
    ['', 'Write a number, like 187.0.'],
    ['187,5', 'Write a point in place of the comma: 187.5.'],
    ['360', 'Write a number from 0 to 359.9.'],
  ])('says of %j in its field what to write, and keeps the reading', async (text, sentence) => {
    const user = userEvent.setup();
    render(<Held from={187} />);
    const field = screen.getByRole('textbox', { name: 'Q-B dial, degrees' });
    await user.clear(field);
    // Pasted whole: a number that is typed turns the dial at each digit.
    if (text !== '') await user.paste(text);
    expect(screen.getByText(sentence).id).toBe(field.getAttribute('aria-describedby'));
    expect(screen.getByRole('slider').getAttribute('aria-valuenow')).toBe('187');
  });
});
