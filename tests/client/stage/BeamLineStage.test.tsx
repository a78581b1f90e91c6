// @vitest-environment jsdom
import { cleanup, fireEvent, render, screen } from '@testing-library/react';
import userEvent from '@testing-library/user-event';
import { afterEach, describe, expect, it, vi } from 'vitest';
import { BeamLineStage, type StageData, turnedByHand } from '../../../src/stage';

afterEach(cleanup);

const STAGE: StageData = {
  wavelengthNm: 810,
  polariser: { axisDeg: 0, axisSigmaDeg: 0.05 },
  plates: [
    {
      id: 'h3',
      name: 'H-3',
      kind: 'half',
      scale: { offsetDeg: 12.4, direction: 1, resolutionDeg: 0.1, rangeDeg: null },
      retardanceDeg: 179.2,
      retardanceSigmaDeg: 0.3,
      dialDeg: 83.5,
      fastAxisDeg: 71.1,
      solutionDialDeg: 83.5,
    },
    {
      id: 'qb',
      name: 'Q-B',
      kind: 'quarter',
      scale: { offsetDeg: 301.73, direction: -1, resolutionDeg: 0.1, rangeDeg: null },
      retardanceDeg: 86.9,
      retardanceSigmaDeg: 0.4,
      dialDeg: 187,
      fastAxisDeg: 114.73,
      solutionDialDeg: 187,
    },
  ],
  before: [
    [1, 0, 0],
    [0.2487, -0.9686, 0],
  ],
  output: { label: 't2', state: [-1 / 3, -Math.sqrt(2) / 3, Math.sqrt(6) / 3] },
  convention: { phase: 'kz-wt', handedness: 'receiver', s3Sign: 'L' },
};

/** What a screen reader is given of each item: the rings' engraving is decoration beside the words. */
function texts(): string[] {
  return screen.getAllByRole('listitem').map((item) => {
    const copy = document.createElement('div');
    copy.append(...[...item.childNodes].map((node) => node.cloneNode(true)));
    for (const hidden of copy.querySelectorAll('[aria-hidden="true"]')) hidden.remove();
    return copy.textContent;
  });
}

/** The same bench with H-3 turned by hand. */
function turned(dialDeg: number): StageData {
  return {
    ...STAGE,
    plates: STAGE.plates.map((plate) => (plate.id === 'h3' ? { ...plate, dialDeg } : plate)),
  };
}

describe('the beam-line stage', () => {
  it('stands in beam order, each plate with its retardance, θ and dial, the light before it', () => {
    render(<BeamLineStage stage={STAGE} />);
    expect(texts()).toEqual([
      'source, 810nm',
      'polariser at H0.00(5)°',
      'then light, H',
      'H-3 179.2(3)°θ 71.10° dial 83.5',
      'then light, linear at −37.8°',
      'Q-B 86.9(4)°θ 114.73° dial 187.0',
      't2 as dialled, to the receiverψ −62.63° χ 27.37°',
    ]);
  });

  it('shows χ with the sign of S3 that the lab uses', () => {
    render(<BeamLineStage stage={{ ...STAGE, convention: { ...STAGE.convention, s3Sign: 'R' } }} />);
    expect(texts().at(-1)).toContain('χ −27.37°');
  });

  it('draws an elliptical input as an ellipse, since no polariser alone makes it', () => {
    render(<BeamLineStage stage={{ ...STAGE, before: [[0.6, 0, 0.8], ...STAGE.before.slice(1)] }} />);
    // S3 = sin 2χ = 0.8.
    expect(texts()[1]).toBe('inputψ 0.0° χ 26.6°');
    expect(screen.queryByText(/polariser/)).toBeNull();
  });

  it('only shows where nobody may turn', () => {
    render(<BeamLineStage stage={STAGE} />);
    expect(screen.queryByRole('slider')).toBeNull();
    expect(screen.queryByRole('button')).toBeNull();
  });

  it('lets a plate be turned by keys and tells which', () => {
    const onDial = vi.fn();
    render(<BeamLineStage stage={STAGE} onDial={onDial} />);
    const slider = screen.getByRole('slider', { name: /Q-B dial, 187\.0 degrees/ });
    fireEvent.keyDown(slider, { key: 'ArrowUp', shiftKey: true });
    expect(onDial).toHaveBeenCalledExactlyOnceWith(1, 188);
  });

  it('offers the way back to the solution only while a plate is turned away from it', async () => {
    const user = userEvent.setup();
    const onBack = vi.fn();
    const { rerender } = render(<BeamLineStage stage={STAGE} onDial={vi.fn()} onBackToSolution={onBack} />);
    expect(screen.queryByRole('button', { name: 'Back to the solution' })).toBeNull();
    rerender(<BeamLineStage stage={turned(85.5)} onDial={vi.fn()} onBackToSolution={onBack} />);
    expect(screen.getByText('H-3 turned by hand')).toBeDefined();
    await user.click(screen.getByRole('button', { name: 'Back to the solution' }));
    expect(onBack).toHaveBeenCalledOnce();
  });

  it('says from where it is seen when someone stands on the source side', () => {
    render(<BeamLineStage stage={STAGE} viewedFrom="source" />);
    expect(screen.getAllByText('as seen from the source')).toHaveLength(2);
  });
});

describe('turned by hand', () => {
  it('begins at more than half a step of the dial, across 360 too', () => {
    expect(turnedByHand(turned(83.54).plates)).toHaveLength(0);
    expect(turnedByHand(turned(83.6).plates)).toHaveLength(1);
    const [plate] = STAGE.plates;
    if (plate === undefined) throw new Error('no plate');
    expect(turnedByHand([{ ...plate, dialDeg: 359.98, solutionDialDeg: 0 }])).toHaveLength(0);
  });
});
