// @vitest-environment jsdom
import { cleanup, render, screen, within } from '@testing-library/react';
import userEvent from '@testing-library/user-event';
import fc from 'fast-check';
import { afterEach, describe, expect, it } from 'vitest';
import type { Stokes } from '../../../shared/optics/stokes';
import { Sphere, type SphereInput } from '../../../src/sphere';
import { placeLabels } from '../../../src/sphere/labels';
import { basisStates, sphereScene } from '../../../src/sphere/scene';
import { placement, viewFrame } from '../../../src/sphere/view';
import { anyView, CONVENTION, mapOf } from './support';

afterEach(cleanup);

const off = (deg: number): Stokes => [0, Math.cos((deg * Math.PI) / 180), Math.sin((deg * Math.PI) / 180)];

const UNITARY: SphereInput = {
  start: [1, 0, 0],
  plates: [{ name: 'H-1', fastAxisDeg: 22.5, retardanceDeg: 178.8 }],
  images: [
    { label: 'H', from: [1, 0, 0], wanted: [0, 1, 0], reached: off(1.2) },
    { label: 'D', from: [0, 1, 0], wanted: [1, 0, 0], reached: [1, 0, 0] },
  ],
  convention: CONVENTION,
};

const set = (count: number): SphereInput => ({
  start: [1, 0, 0],
  plates: [],
  points: Array.from({ length: count }, (_, k) => ({ label: `s${k + 1}`, state: off(k * 10) })),
  convention: CONVENTION,
});

describe('the images of reference states', () => {
  it('are a reticle where wanted and a lit dot where reached, named with a prime, with no line between', () => {
    const scene = sphereScene(UNITARY);
    const at = (id: string) => scene.marks.find((mark) => mark.id === id);
    expect(at('wanted-0')).toMatchObject({ kind: 'wanted', at: [0, 1, 0] });
    expect(at('image-0')).toMatchObject({ kind: 'image', at: off(1.2) });
    expect(at('image-1')?.at).toEqual(at('wanted-1')?.at);
    expect(scene.labels.filter(({ role }) => role === 'image').map(({ text }) => text)).toEqual(['H′', 'D′']);
    expect(scene.lines.map(({ id }) => id)).toEqual(
      sphereScene({ ...UNITARY, images: undefined }).lines.map(({ id }) => id),
    );
  });

  it('keep their names apart from each other and from the letters where all six stand on basis states', () => {
    const basis = basisStates(CONVENTION);
    const scene = sphereScene({
      start: [1, 0, 0],
      plates: [],
      images: basis.map(({ letter, state }) => ({
        label: letter,
        from: state,
        wanted: state,
        reached: state,
      })),
      convention: CONVENTION,
    });
    fc.assert(
      fc.property(anyView, (view) => {
        const placed = placeLabels(scene, viewFrame(view), placement(456, 366, 1)).filter(
          ({ role }) => role !== 'degrees',
        );
        expect(placed).toHaveLength(12);
        for (const [index, one] of placed.entries()) {
          for (const other of placed.slice(index + 1)) {
            const apart =
              Math.abs(one.x - other.x) >= one.halfWidth + other.halfWidth ||
              Math.abs(one.y - other.y) >= one.halfHeight + other.halfHeight;
            expect(apart, `${one.text} and ${other.text}`).toBe(true);
          }
        }
      }),
      { numRuns: 100 },
    );
  });

  it('are told in the figure’s name and as a table', async () => {
    const user = userEvent.setup();
    render(<Sphere input={UNITARY} />);
    expect(screen.getByRole('img').getAttribute('aria-label')).toContain(
      '2 reference states; the farthest from its place is H, off by 1.20° on the sphere.',
    );
    await user.click(screen.getByRole('button', { name: 'in words' }));
    const rows = within(screen.getByRole('table', { name: /reference states/ })).getAllByRole('row');
    expect(rows.map((row) => row.textContent)).toEqual([
      'stategoes towanteddistance',
      expect.stringMatching(/^Hellipse at 45\.0°.*Doff by 1\.20°$/),
      'DH1.0000, 0.0000, 0.0000Hmet within 0.01°',
    ]);
  });
});

describe('a set of states', () => {
  it('is a dot each, named up to twelve and not above', () => {
    for (const [count, named] of [
      [12, 12],
      [13, 0],
      [400, 0],
    ] as const) {
      const scene = sphereScene(set(count));
      expect(scene.marks.filter(({ kind }) => kind === 'point')).toHaveLength(count);
      expect(scene.labels.filter(({ role }) => role === 'point')).toHaveLength(named);
    }
  });

  it('doesn’t say a basis letter twice', () => {
    const scene = sphereScene({
      ...set(0),
      points: [
        { label: 'D', state: [0, 1, 0] },
        { label: 'd+', state: [0, 1, 0] },
      ],
    });
    expect(scene.labels.filter(({ role }) => role === 'point').map(({ text }) => text)).toEqual(['d+']);
  });

  it('is told as a list of the first twelve and how many more, without a path that isn’t there', async () => {
    const user = userEvent.setup();
    render(<Sphere input={set(14)} />);
    expect(screen.getByRole('img').getAttribute('aria-label')).toMatch(
      /^Sphere of states\. 14 states: s1, D; s2, ellipse at 45\.0°.*; and 2 more\.$/,
    );
    await user.click(screen.getByRole('button', { name: 'in words' }));
    expect(screen.queryByRole('table')).toBeNull();
    const items = screen.getAllByRole('listitem').map((item) => item.textContent);
    expect(items).toHaveLength(13);
    expect(items[0]).toBe('s1 D');
    expect(items.at(-1)).toBe('and 2 more');
    expect(screen.queryByText('a tick every 10° of turn')).toBeNull();
  });
});

describe('the words beside the sphere', () => {
  it('give the phases and the reach, and say what flags and patterns mean', async () => {
    const user = userEvent.setup();
    const reach = mapOf(6, (latitudeDeg) => (Math.abs(latitudeDeg) > 72 ? 0 : 2));
    render(<Sphere input={{ ...UNITARY, images: undefined, phase: true, reach }} />);
    expect(screen.getByText(/^Phase behind the plates against the start/)).toBeDefined();
    expect(screen.getByText(/out of reach: around both poles to 18°/)).toBeDefined();
    for (const note of ['pennant from hairline: phase', 'hatched: out of reach', 'dotted: in two ways']) {
      expect(screen.getByText(note)).toBeDefined();
    }
    await user.click(screen.getByRole('button', { name: 'in words' }));
    const rows = within(screen.getByRole('table', { name: /Phase against the start/ })).getAllByRole('row');
    expect(rows.map((row) => row.textContent)).toEqual([
      'behindtotaldynamicgeometric',
      expect.stringMatching(/^H-1−\d+\.\d°−63\.2°−\d+\.\d°$/),
    ]);
  });
});
