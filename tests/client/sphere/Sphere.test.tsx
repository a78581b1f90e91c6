// @vitest-environment jsdom
import { act, cleanup, fireEvent, render, screen, within } from '@testing-library/react';
import userEvent from '@testing-library/user-event';
import { afterEach, beforeEach, describe, expect, it, vi } from 'vitest';
import { createSphereViewStore, FieldPlot, Sphere, type SphereInput } from '../../../src/sphere';
import { HOME_VIEW } from '../../../src/sphere/view';
import { CONVENTION } from './support';

const INPUT: SphereInput = {
  start: [1, 0, 0],
  plates: [
    { name: 'H-3', fastAxisDeg: 71.1, retardanceDeg: 179.2 },
    { name: 'Q-B', fastAxisDeg: 114.73, retardanceDeg: 86.9 },
  ],
  target: { label: 't2', state: [-1 / 3, -Math.sqrt(2) / 3, Math.sqrt(6) / 3] },
  convention: CONVENTION,
};

/** Every element is on the screen at once. */
class SeenAtOnce implements Partial<IntersectionObserver> {
  constructor(private readonly tell: (entries: { isIntersecting: boolean }[]) => void) {}
  observe(): void {
    this.tell([{ isIntersecting: true }]);
  }
  disconnect(): void {
    /* nothing is held */
  }
}

/** What a browser without WebGL answers. */
const askForContext = vi.fn<(kind: string) => null>(() => null);

beforeEach(() => {
  askForContext.mockClear();
  vi.stubGlobal('IntersectionObserver', SeenAtOnce);
  vi.spyOn(HTMLCanvasElement.prototype, 'getContext').mockImplementation(askForContext);
});
afterEach(() => {
  cleanup();
  vi.unstubAllGlobals();
  vi.restoreAllMocks();
});

describe('the sphere without WebGL', () => {
  it('asks for WebGL, gets none, and shows the whole drawing as SVG', () => {
    const { container } = render(<Sphere input={INPUT} />);
    expect(askForContext).toHaveBeenCalledWith('webgl2');
    const figure = screen.getByRole('img', { name: /Path on the sphere/ });
    expect(figure.dataset['renderer']).toBe('svg');
    expect(container.querySelector('canvas')).toBeNull();
    for (const id of ['turn-0', 'turn-1', 'equator']) {
      expect(container.querySelector(`[data-line="${id}"]`)).not.toBeNull();
    }
    for (const id of ['target', 'reached', 'axis-0', 'axis-1', 'basis-L']) {
      expect(container.querySelector(`[data-mark="${id}"]`)).not.toBeNull();
    }
    expect(container.querySelectorAll('[data-head]')).toHaveLength(2);
    expect(container.querySelector('[data-label="axis-1"]')?.textContent).toBe('Q-B 114.7°');
  });

  it('tells the path in its name', () => {
    // 0.04° is the cost of whole 0.1° dials: (0.00073 rad / 2)² is the 1.3 × 10⁻⁷ that the look's picture 03 gives for it.
    render(<Sphere input={INPUT} />);
    expect(screen.getByRole('img').getAttribute('aria-label')).toBe(
      'Path on the sphere. The light starts at H; H-3 turns it by 179.2° counter-clockwise about 71.1°; ' +
        'Q-B turns it by 86.9° counter-clockwise about 114.7°. It ends at ellipse at −62.6°, ellipticity 27.4°, ' +
        'counter-clockwise to the receiver (L), 0.04° from t2 on the sphere.',
    );
  });

  it('turns by keys alone, and says after a moment where it is seen from', () => {
    vi.useFakeTimers();
    try {
      const view = createSphereViewStore();
      render(<Sphere input={INPUT} view={view} />);
      const figure = screen.getByRole('img');
      figure.focus();
      fireEvent.keyDown(figure, { key: 'ArrowLeft' });
      fireEvent.keyDown(figure, { key: 'ArrowDown', shiftKey: true });
      expect(view.getState().view).toEqual({
        ...HOME_VIEW,
        longitudeDeg: HOME_VIEW.longitudeDeg + 5,
        latitudeDeg: HOME_VIEW.latitudeDeg + 1,
      });
      expect(screen.getByRole('status').textContent).toBe('');
      act(() => {
        vi.advanceTimersByTime(600);
      });
      expect(screen.getByRole('status').textContent).toBe(
        'In the middle: linear light at −26.5°, seen from 25° above the equator.',
      );
      fireEvent.keyDown(figure, { key: 'Escape' });
      expect(document.activeElement).not.toBe(figure);
    } finally {
      vi.useRealTimers();
    }
  });

  it('does by buttons all that the keys do, so that nothing needs a drag', async () => {
    const user = userEvent.setup();
    const view = createSphereViewStore();
    render(<Sphere input={INPUT} view={view} />);
    await user.click(screen.getByRole('button', { name: 'Turn left by 5°' }));
    expect(view.getState().view.longitudeDeg).toBe(HOME_VIEW.longitudeDeg + 5);
    await user.click(screen.getByRole('button', { name: 'Face D, again for A' }));
    expect(view.getState().view).toMatchObject({ longitudeDeg: 90, latitudeDeg: 0 });
    await user.click(screen.getByRole('button', { name: 'home' }));
    expect(view.getState().view).toEqual(HOME_VIEW);
  });

  it('gives the same path as a table on request', async () => {
    const user = userEvent.setup();
    render(<Sphere input={INPUT} />);
    await user.click(screen.getByRole('button', { name: 'in words' }));
    const rows = within(screen.getByRole('table')).getAllByRole('row');
    expect(rows.map((row) => row.textContent)).toEqual([
      'platefast axisturnstate after it, with S1, S2, S3',
      'before the plates——H1.0000, 0.0000, 0.0000',
      expect.stringMatching(/^H-371\.10°179\.2° counter-clockwiseellipse at −37\.8°, ellipticity 0\.2°/),
      expect.stringMatching(/^Q-B114\.73°86\.9° counter-clockwiseellipse at −62\.6°/),
      expect.stringMatching(/^target t2—the end is 0\.04° from t2 on the sphere/),
    ]);
  });
});

describe('the field plot', () => {
  it('says both traces in words', () => {
    render(<FieldPlot state={[0, 0, 1]} label="c+" />);
    expect(
      screen.getByRole('img', {
        name: 'Field of c+ at z = 0 over two periods: E_V follows E_H by 90.0°; counter-clockwise to the receiver.',
      }),
    ).toBeDefined();
  });
});
