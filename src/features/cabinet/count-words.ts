import type { CabinetCounts } from '../../../shared/schemas/cabinet';

const words = [
  'no',
  'one',
  'two',
  'three',
  'four',
  'five',
  'six',
  'seven',
  'eight',
  'nine',
  'ten',
  'eleven',
  'twelve',
] as const;

const inWords = (count: number): string => words[count] ?? String(count);

/** Plates in use, whatever their state. */
export function platesInUse({ plates }: Pick<CabinetCounts, 'plates'>): number {
  return Object.entries(plates).reduce((sum, [health, count]) => sum + (health === 'retired' ? 0 : count), 0);
}

/** "12 plates, 11 of them seated; two fast axes not settled." */
export function countWords(counts: CabinetCounts): string {
  const all = platesInUse(counts);
  const seated = all - counts.plates['not-seated'];
  const plates = all === 1 ? '1 plate' : `${all} plates`;
  const where = seated === all ? (all === 1 ? ', seated' : ', all seated') : `, ${seated} of them seated`;
  const open =
    counts.openAxes === 0
      ? ''
      : `; ${inWords(counts.openAxes)} fast ${counts.openAxes === 1 ? 'axis' : 'axes'} not settled`;
  const bare = counts.plates['not-calibrated'];
  const uncalibrated =
    bare === 0 ? '' : `; ${inWords(bare)} not calibrated in ${bare === 1 ? 'its' : 'their'} seat`;
  return `${plates}${all === 0 ? '' : where}${open}${uncalibrated}.`;
}
