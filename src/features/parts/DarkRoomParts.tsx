import { useState } from 'react';
import { Button } from '../../components/Button';
import { dialWords } from '../../components/dial-words';
import { ErrorNote } from '../../components/ErrorNote';
import { FarField } from '../../components/FarField';
import { RingDial } from '../../components/RingDial';
import { Scientific } from '../../components/Scientific';
import { formatDial } from '../../lib/format';

const scale = { offsetDeg: 12.4, direction: 1, resolutionDeg: 0.1 } as const;
const fromDeg = 39.9;
const toDeg = 83.5;

const inks = [
  { name: 'act', ratio: '7.7', hex: '#F28018', fill: 'bg-act' },
  { name: 'ink', ratio: '6.0', hex: '#DC6C10', fill: 'bg-ink' },
  { name: 'ink 2', ratio: '5.2', hex: '#C9640A', fill: 'bg-ink-2' },
  { name: 'ink 3', ratio: '4.8', hex: '#C26008', fill: 'bg-ink-3' },
  { name: 'rule', ratio: '3.2', hex: '#964B0A', fill: 'bg-rule' },
] as const;

/** The bench's parts in the dark room, whatever the page's own theme is. Pressing the button dials the ring; the note undoes it. */
export function DarkRoomParts() {
  const [dialled, setDialled] = useState(false);
  const [counts, setCounts] = useState('43');
  const { from, sense, amount } = dialWords(fromDeg, toDeg, scale);
  return (
    <section
      aria-label="At the bench, in the dark"
      data-theme="dark-room"
      data-lamp="mid"
      className="p-10 max-sm:px-5"
    >
      <div className="-mt-4 flex justify-center">
        <RingDial
          radius={108}
          kind="half"
          scale={scale}
          readingDeg={dialled ? toDeg : fromDeg}
          toDeg={dialled ? undefined : toDeg}
          label={`H-3 stands at ${formatDial(dialled ? toDeg : fromDeg)}`}
        />
      </div>
      <p className="-mt-2.5 text-center">
        <b className="text-[1.375rem] text-act">H-3</b>{' '}
        <span className="ml-1 text-ink-2">first after the polariser</span>
      </p>
      <p className="mt-4.5 text-center font-mono text-dial-far text-act">{formatDial(toDeg)}</p>
      <p className="mt-4.5 text-center text-[1.1875rem]">
        {dialled ? (
          'dialled 83.5'
        ) : (
          <>
            from {from} {sense} by <span className="font-mono">{amount}</span>
          </>
        )}
      </p>
      <div className="mt-7 grid grid-cols-[120fr_270fr] gap-4">
        <Button
          size="far"
          className="px-3"
          onClick={() => {
            setDialled(false);
          }}
        >
          Note trouble
        </Button>
        <Button
          size="far"
          kind="filled"
          className="px-3"
          onClick={() => {
            setDialled(true);
          }}
        >
          H-3 says 83.5
        </Button>
      </div>
      <div className="mt-7 border-t border-hair pt-3.5">
        <FarField
          label="counts, reflected"
          value={counts}
          onChange={(event) => {
            setCounts(event.currentTarget.value);
          }}
        />
      </div>
      <ErrorNote className="mt-6" announce={false} title="83.4 is 0.1° short of 83.5">
        That costs 1 − F <Scientific value={1.2e-5} mono={false} />. Turn once more, or keep what you dialled.
      </ErrorNote>
      <ul className="m-0 mt-13 grid list-none grid-cols-5 gap-2 p-0 text-ink-2">
        {inks.map(({ name, ratio, hex, fill }) => (
          <li key={name} className="text-[1rem] leading-5">
            <span className={`block h-8.5 ${fill}`} />
            <span className="mt-1.5 block whitespace-nowrap">
              {name} <span className="font-mono">{ratio}</span>
            </span>
            <span className="block font-mono tracking-[-0.03em]">{hex}</span>
          </li>
        ))}
      </ul>
    </section>
  );
}
