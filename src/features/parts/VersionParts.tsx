import { BasisMark, type BasisLetter } from '../../components/BasisMark';
import { SectionHead } from '../../components/SectionHead';
import { type SealState, sealWords, VersionSeal } from '../../components/VersionSeal';

const seals: readonly { readonly state: SealState; readonly number: number | null }[] = [
  { state: 'draft', number: null },
  { state: 'saved', number: 15 },
  { state: 'in-review', number: 15 },
  { state: 'changes-asked', number: 15 },
  { state: 'released', number: 15 },
  { state: 'superseded', number: 14 },
  { state: 'withdrawn', number: 12 },
];
const letters: readonly BasisLetter[] = ['H', 'V', 'D', 'A', 'R', 'L'];

/** Version seals and basis marks. */
export function VersionParts() {
  return (
    <div className="grid -mb-2 gap-x-9 gap-y-6 sm:grid-cols-[540fr_300fr]">
      <section aria-labelledby="versions">
        <SectionHead size="small" id="versions">
          Versions
        </SectionHead>
        <ul className="m-0 mt-1 flex list-none flex-wrap justify-between p-0">
          {seals.map(({ state, number }) => (
            <li key={state} className="flex w-19 flex-col dark-room:w-24 items-center">
              <VersionSeal state={state} number={number} decorative />
              <span className="mt-1 text-center text-s text-ink-2">{sealWords[state]}</span>
            </li>
          ))}
        </ul>
      </section>
      <section aria-labelledby="basis">
        <SectionHead size="small" id="basis">
          Basis: shape, then colour
        </SectionHead>
        <ul className="m-0 mt-3 flex list-none p-0">
          {letters.map((letter) => (
            <li key={letter} className="flex w-1/6 max-w-13 flex-col items-center">
              <BasisMark letter={letter} decorative />
              <b className="mt-3 text-s">{letter}</b>
            </li>
          ))}
        </ul>
      </section>
    </div>
  );
}
