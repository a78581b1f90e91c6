import type { Bench, BenchPart } from './schemas/benches';

/** What of a bench says whether its beam can be dialled. */
export type BenchReadiness = Pick<Bench, 'name' | 'notReady'>;

const whyWords = {
  'not-seated': 'sits in no mount. Seat it and calibrate it',
  'not-calibrated': 'has not been calibrated since it was seated. Calibrate it',
} as const;

/**
 * One sentence for each plate that keeps one part of a bench from being used, or of both. A zero holds as long as a plate
 * stays in its mount, so an old one is never taken in its place.
 */
export function notReadySentences({ name, notReady }: BenchReadiness, part?: BenchPart): string[] {
  return notReady
    .filter((plate) => part === undefined || plate.part === part)
    .map((plate) => `${plate.name} ${whyWords[plate.why]}, then ${name} can be used again.`);
}
