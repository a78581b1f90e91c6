import { type Convention, CONVENTION_SETS, type ConventionSet } from '../../../shared/optics';

export type Flag = keyof Convention;

export const FLAGS: readonly Flag[] = ['phase', 'handedness', 's3Sign'];

/** A flag as a sentence names it. */
export const flagNames: Record<Flag, string> = { phase: 'phase', handedness: 'hands', s3Sign: 'sign of S3' };

export function phaseWords(phase: Convention['phase']): string {
  return phase === 'kz-wt' ? 'kz − ωt' : 'ωt − kz';
}

/** The three flags in a line: "kz − ωt, receiver, + is L". */
export function flagWords({ phase, handedness, s3Sign }: Convention): string {
  return `${phaseWords(phase)}, ${handedness}, + is ${s3Sign}`;
}

/** One flag of a convention in words: "phase ωt − kz", "hands named from the source", "+S3 is R". */
export function flagValueWords(flag: Flag, { phase, handedness, s3Sign }: Convention): string {
  if (flag === 'phase') return `phase ${phaseWords(phase)}`;
  return flag === 'handedness' ? `hands named from the ${handedness}` : `+S3 is ${s3Sign}`;
}

/** The eight conventions that three flags make, in one order. */
export const EVERY_CONVENTION: readonly Convention[] = (['kz-wt', 'wt-kz'] as const).flatMap((phase) =>
  (['receiver', 'source'] as const).flatMap((handedness) =>
    (['R', 'L'] as const).map((s3Sign) => ({ phase, handedness, s3Sign })),
  ),
);

/** "a", "a and b", "a, b and c". */
export function listWords(parts: readonly string[]): string {
  const last = parts.at(-1) ?? '';
  return parts.length < 2 ? last : `${parts.slice(0, -1).join(', ')} and ${last}`;
}

const countWords = ['none', 'one', 'two', 'three', 'four', 'five', 'six', 'seven', 'eight', 'nine', 'ten'];

export function countWord(count: number): string {
  return countWords[count] ?? String(count);
}

/** The same at the head of a sentence. */
export function capitalised(text: string): string {
  return text.charAt(0).toUpperCase() + text.slice(1);
}

/** How many published sets there are, in words: "eight". */
export const setCountWord = countWord(CONVENTION_SETS.length);

/** How well a set's flag is known. */
export type Knowledge = 'read' | 'from memory' | 'filled in';

/** Whether a flag was read in one of the set's sources, is recalled of one, or is the usual companion of the others. */
export function knowledgeOf({ sources, notFixedBySource }: ConventionSet, flag: Flag): Knowledge {
  if (notFixedBySource.includes(flag)) return 'filled in';
  return sources.some(({ read }) => read.includes(flag)) ? 'read' : 'from memory';
}

/** All three in a line: "hands read; phase and sign of S3 filled in". */
export function knowledgeWords(set: ConventionSet): string {
  return (['read', 'from memory', 'filled in'] as const)
    .flatMap((knowledge) => {
      const flags = FLAGS.filter((flag) => knowledgeOf(set, flag) === knowledge);
      return flags.length === 0 ? [] : [`${listWords(flags.map((flag) => flagNames[flag]))} ${knowledge}`];
    })
    .join('; ');
}
