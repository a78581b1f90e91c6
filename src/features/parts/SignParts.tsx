import type { ReactNode } from 'react';
import { AgeRing, ageWords } from '../../components/AgeRing';
import { SectionHead } from '../../components/SectionHead';
import {
  CautionSign,
  HeldSign,
  NewSeatSign,
  OutOfReachSign,
  SomeoneHere,
  VernierFresh,
  VernierStale,
} from '../../components/SmallSigns';

const signs: readonly { readonly sign: ReactNode; readonly words: string }[] = [
  { sign: <VernierFresh />, words: 'angles fresh' },
  { sign: <VernierStale />, words: 'angles stale' },
  { sign: <AgeRing radius={13} fastAxisDeg={24} ageDays={27} dueDays={90} />, words: ageWords(27, 90) },
  { sign: <AgeRing radius={13} fastAxisDeg={24} ageDays={104} dueDays={90} />, words: ageWords(104, 90) },
  { sign: <OutOfReachSign />, words: 'out of reach' },
  { sign: <HeldSign />, words: 'held solution' },
  { sign: <SomeoneHere initials="TR" name="Tamsin Reeve" />, words: 'someone is here' },
  { sign: <NewSeatSign />, words: 'new seat' },
  { sign: <CautionSign />, words: 'laser caution' },
];

/** The small signs; each stands with its word. */
export function SignParts() {
  return (
    <section aria-labelledby="signs">
      <SectionHead size="small" id="signs">
        Small signs
      </SectionHead>
      <ul className="m-0 mt-2 flex list-none flex-wrap justify-between p-0">
        {signs.map(({ sign, words }) => (
          <li key={words} className="flex w-23 flex-col items-center">
            <span className="flex h-11 items-center justify-center">{sign}</span>
            <span className="mt-1.5 text-center text-s text-ink-2">{words}</span>
          </li>
        ))}
      </ul>
    </section>
  );
}
