import { CONVENTION_SETS, type ConventionSource } from '../../../shared/optics';
import { SectionHead } from '../../components/SectionHead';
import { capitalised, flagNames, flagWords, knowledgeWords, listWords } from './flag-words';

function sourceKnowledge({ read, recalled }: ConventionSource): string {
  const parts = [
    read.length > 0 ? `${listWords(read.map((flag) => flagNames[flag]))} read` : null,
    recalled.length > 0 ? `${listWords(recalled.map((flag) => flagNames[flag]))} from memory` : null,
  ].filter((part) => part !== null);
  return parts.join('; ');
}

/** Every set with the texts behind it: what each says, and whether that was read or is recalled. */
export function SetSources() {
  return (
    <section aria-labelledby="set-sources">
      <SectionHead id="set-sources">Where the sets come from</SectionHead>
      <p className="text-s text-ink-2 mt-1 max-w-[52rem]">
        “Read” is what was read in the text itself or in a public page that quotes it. “From memory” is
        recalled: look it up before you cite it. “Filled in” is what no source of the set says; the usual
        companion of the others stands there.
      </p>
      <ul className="mt-3 grid list-none grid-cols-1 gap-x-14 p-0 lg:grid-cols-2">
        {CONVENTION_SETS.map((set) => (
          <li key={set.id} className="border-hair border-t py-3">
            <h3 className="text-body font-strong">{set.name}</h3>
            <p className="text-s text-ink-2">
              {flagWords(set.convention)}. {capitalised(knowledgeWords(set))}.
            </p>
            <ul className="text-s mt-1.5 list-none space-y-1.5 p-0">
              {set.sources.map((source) => (
                <li key={source.text}>
                  {source.text}: <span className="text-ink-2">{source.states}</span> (
                  {sourceKnowledge(source)})
                </li>
              ))}
            </ul>
          </li>
        ))}
      </ul>
    </section>
  );
}
