import { classNames } from '../../components/class-names';

const tokens = [
  { name: 'paper', ratio: null, fill: 'bg-paper' },
  { name: 'glass', ratio: null, fill: 'bg-glass' },
  { name: 'ink', ratio: '15.7', fill: 'bg-ink' },
  { name: 'ink 2', ratio: '8.1', fill: 'bg-ink-2' },
  { name: 'ink 3', ratio: '5.4', fill: 'bg-ink-3' },
  { name: 'rule', ratio: '3.6', fill: 'bg-rule' },
  { name: 'beam', ratio: '4.1', fill: 'bg-beam' },
  { name: 'lit', ratio: null, fill: 'bg-lit' },
  { name: 'fault', ratio: '6.0', fill: 'bg-fault' },
  { name: 'hair', ratio: null, fill: 'bg-hair' },
] as const;

/** The daylight colours with their contrast on paper. */
export function TokenParts() {
  return (
    <section aria-label="Colours of daylight with their contrast on paper" data-theme="day">
      <ul className="m-0 grid list-none grid-cols-5 gap-2 p-0 sm:grid-cols-10">
        {tokens.map(({ name, ratio, fill }) => (
          <li key={name} className="text-xs text-ink-2">
            <span className={classNames('block h-6 border border-rule', fill)} />
            <span className="mt-1 block">
              {name} {ratio !== null && <span className="font-mono">{ratio}</span>}
            </span>
          </li>
        ))}
      </ul>
    </section>
  );
}
