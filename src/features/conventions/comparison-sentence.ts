import { type ComparedRow, differingNames } from './compared-rows';
import { capitalised, countWord, listWords, setCountWord } from './flag-words';

/** Who wrote what the others are held against: the reader, or another convention that it was typed in. */
type Writer = 'you' | 'typed';

interface Compared {
  readonly kind: 'state' | 'unitary';
  readonly rows: readonly ComparedRow[];
  /** "the lab's own" where it was not typed in it. */
  readonly writer: Writer;
}

const partOf = ({ parts }: ComparedRow, id: string) => parts.find((part) => part.id === id);
const all = (count: number, rows: readonly unknown[]) => count === rows.length;

function howMany(count: number, of: readonly unknown[]): string {
  if (all(count, of)) return `All ${setCountWord}`;
  return `${capitalised(countWord(count))} of the ${setCountWord}`;
}

const verb = (count: number, one: string, more: string) => (count === 1 ? one : more);

/** "five call it left, three right". */
function calls(rows: readonly ComparedRow[]): string | null {
  const hands = rows.map((row) => partOf(row, 'hand')?.values[0]?.plain ?? '');
  const counts = (['left', 'right'] as const)
    .map((hand) => ({ hand, count: hands.filter((text) => text.startsWith(hand)).length }))
    .filter(({ count }) => count > 0)
    .sort((one, other) => other.count - one.count);
  const [first, second] = counts;
  if (first === undefined) return null;
  if (second === undefined) return `all call it ${first.hand}`;
  return `${countWord(first.count)} ${verb(first.count, 'calls', 'call')} it ${first.hand}, ${countWord(second.count)} ${second.hand}`;
}

/** What the published sets make of a state, in one sentence. Computed from the rows, so that it says what stands below it. */
function stateSentence(sets: readonly ComparedRow[], like: string): string {
  const same = sets.filter((row) => differingNames(row).length === 0).length;
  const head = `${howMany(same, sets)} ${verb(same, 'writes', 'write')} this light ${like}`;
  const hands = calls(sets);
  return hands === null
    ? `${head}: without a hand there is nothing to disagree about.`
    : `${head}; ${hands}.`;
}

function unitarySentence(sets: readonly ComparedRow[], like: string): string {
  const agree = (id: string) => sets.filter((row) => partOf(row, id)?.differs === false).length;
  const [matrices, muellers] = [agree('matrix'), agree('mueller')];
  return (
    `${howMany(matrices, sets)} ${verb(matrices, 'writes', 'write')} this matrix ${like}; ` +
    `${all(muellers, sets) ? 'all' : countWord(muellers)} ${verb(muellers, 'has', 'have')} the same Mueller matrix.`
  );
}

/** The sentence at the head of the table, and a second one for one's own lab where it was not typed in its convention. */
export function comparisonSentence({ kind, rows, writer }: Compared): string {
  const sets = rows.filter(({ set }) => set !== null);
  const like = writer === 'you' ? 'as you do' : 'as it is typed';
  const sentence = kind === 'state' ? stateSentence(sets, like) : unitarySentence(sets, like);
  const own = rows.find(({ id }) => id === 'own');
  if (own === undefined || writer === 'you') return sentence;
  const differing = differingNames(own);
  return differing.length === 0
    ? `${sentence} Your lab writes it just so.`
    : `${sentence} Your lab writes it otherwise: ${listWords(differing)} ${verb(differing.length, 'differs', 'differ')}.`;
}
