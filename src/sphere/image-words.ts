import type { Convention } from '../../shared/optics/convention';
import { formatAngle } from '../lib/format';
import type { SphereImage } from './scene';
import { type StateWords, stateWords } from './state-words';
import { angleBetweenDeg } from './vec';

/** Where one reference state goes, in words. */
export interface ImageWords {
  readonly label: string;
  readonly reached: StateWords;
  readonly wanted: StateWords;
  readonly offDeg: number;
}

export function imagesInWords(images: readonly SphereImage[], convention: Convention): ImageWords[] {
  return images.map(({ label, wanted, reached }) => ({
    label,
    reached: stateWords(reached, convention),
    wanted: stateWords(wanted, convention),
    offDeg: angleBetweenDeg(reached, wanted),
  }));
}

/** `off by 1.20°`, or how well it is met. */
export function offInWords(offDeg: number): string {
  return offDeg < 0.01 ? 'met within 0.01°' : `off by ${formatAngle(offDeg, 2)}`;
}

/** How well the reference states are taken to their places, by the worst of them. */
export function imagesSummary(images: readonly ImageWords[]): string[] {
  const [first] = images;
  if (first === undefined) return [];
  const worst = images.reduce((far, one) => (one.offDeg > far.offDeg ? one : far), first);
  const many = images.length === 1 ? 'One reference state' : `${images.length} reference states`;
  return [
    worst.offDeg < 0.01
      ? `${many}, each where it should be within 0.01°.`
      : `${many}; the farthest from its place is ${worst.label}, ${offInWords(worst.offDeg)} on the sphere.`,
  ];
}
