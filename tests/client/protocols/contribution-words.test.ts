import { describe, expect, it } from 'vitest';
import { type Contribution, degrees, toRadians } from '../../../shared/optics';
import { sigmaText } from '../../../src/features/protocols/designer/contribution-words';

const of = (sigma: number, unit: Contribution['unit']): Contribution => ({
  kind: unit === 'ratio' ? 'extinction' : 'retardance',
  plate: null,
  sigma,
  unit,
  infidelity: 1e-5,
  share: 1,
  gainIfHalved: 0,
});

describe('the σ of a contribution', () => {
  it.each([
    [1.5e-5, '1.5e−5'],
    [1e-5, '1e−5'],
    [2.46e-4, '2.5e−4'],
  ])('of a leak of %s is %s', (sigma, text) => {
    expect(sigmaText(of(sigma, 'ratio'))).toBe(text);
  });

  it.each([
    [0.25, '0.25°'],
    [0.2, '0.2°'],
    [0.0289, '0.029°'],
    [1.24, '1.2°'],
    [12.3, '12°'],
  ])('of an angle of %s° is %s', (sigmaDeg, text) => {
    expect(sigmaText(of(toRadians(degrees(sigmaDeg)), 'rad'))).toBe(text);
  });
});
