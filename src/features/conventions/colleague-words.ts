import {
  type Flag,
  flagNames,
  FLAGS,
  flagValueWords,
  capitalised,
  countWord,
  listWords,
  setCountWord,
} from './flag-words';
import type { Clash, Elimination, Evidence, JudgedSet } from './which-convention';

type Judged = Extract<Elimination, { kind: 'judged' }>;

/** Facts of one light, in the order in which they are asked for, each with the flags that it helps to settle. */
const asks: readonly { readonly words: string; readonly of: readonly Flag[] }[] = [
  { words: 'its Jones vector as they write it', of: ['phase'] },
  { words: 'which way it turns for the receiver', of: ['phase', 'handedness'] },
  { words: 'what they call it', of: ['handedness', 's3Sign'] },
  { words: 'the sign of its S3', of: ['s3Sign'] },
];

/** "Ask of one light that turns: what they call it and the sign of its S3." Each fact once, however many flags it is for. */
function askSentence(open: readonly Flag[]): string {
  const facts = asks.filter((ask) => ask.of.some((flag) => open.includes(flag)));
  return `Ask of one light that turns: ${listWords(facts.map(({ words }) => words))}.`;
}

/** How many sets fit, what is certain by now, and what would settle the rest. */
export function eliminationSentences({ remaining, settled, sets }: Judged): readonly string[] {
  const [one] = remaining;
  if (one === undefined) {
    return [
      'No convention fits all of this at once. One of the answers is about another light, or seen from the other side.',
    ];
  }
  const fitting = sets.filter(({ fits }) => fits).length;
  const head =
    fitting === 0
      ? 'No published set fits.'
      : `${capitalised(countWord(fitting))} of the ${setCountWord} ${fitting === 1 ? 'fits' : 'fit'}.`;
  const certain =
    settled.length === 0
      ? []
      : [`Certain by now: ${listWords(settled.map((flag) => flagValueWords(flag, one)))}.`];
  const open = FLAGS.filter((flag) => !settled.includes(flag));
  const asked =
    open.length === 0
      ? []
      : [`Still open: ${listWords(open.map((flag) => flagNames[flag]))}. ${askSentence(open)}`];
  return [head, ...certain, ...asked];
}

const clashWords: Record<Clash, (evidence: Evidence) => string> = {
  rotation: ({ rotation }) =>
    `reads that vector as turning ${rotation === 'clockwise' ? 'counter-clockwise' : 'clockwise'}`,
  letter: ({ letter }) => `calls it ${letter === 'L' ? 'right' : 'left'}`,
  s3: ({ s3 }) => `writes its S3 with ${s3 === '+' ? 'a minus' : 'a plus'}`,
};

/** Why a set fits, or what speaks against it. */
export function judgedWords(
  { fits, otherwise, asConvention, clashes }: JudgedSet,
  evidence: Evidence,
): string {
  if (!fits) return listWords(clashes.map((clash) => clashWords[clash](evidence)));
  if (otherwise.length === 0) return 'fits';
  return `fits with ${listWords(otherwise.map((flag) => flagValueWords(flag, asConvention)))}, of which its sources say nothing`;
}
