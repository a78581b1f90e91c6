import { useState } from 'react';
import type { SettingSolution, SolvedTarget } from '../../../shared/optics/solve-target';
import type { SolvingPlate } from '../../../shared/protocol/solving-plates';
import { RingDial } from '../../components/RingDial';
import { Scientific } from '../../components/Scientific';
import { TextButton } from '../../components/TextLink';
import { formatDial, formatTheta } from '../../lib/format';

/** A plate as this page names it. */
export interface NamedPlate {
  readonly name: string;
  readonly kind: 'half' | 'quarter' | 'other';
  readonly plate: SolvingPlate;
}

const countWords = ['No', 'One', 'Two', 'Three'] as const;

function PlateSetting(props: {
  readonly named: NamedPlate;
  readonly dialDeg: number;
  readonly fastAxisDeg: number;
  readonly ideal: boolean;
}) {
  const { named, dialDeg, fastAxisDeg, ideal } = props;
  const { mount, calibration } = named.plate;
  const dial = formatDial(dialDeg, mount.resolutionDeg);
  const theta = formatTheta(fastAxisDeg);
  return (
    <div className="row-span-4 grid min-w-0 grid-rows-subgrid justify-items-center pb-4 text-center">
      <RingDial
        radius={70}
        kind={named.kind}
        scale={{ offsetDeg: calibration.offsetDeg, direction: mount.direction }}
        readingDeg={dialDeg}
        className="max-w-full"
      />
      <p className="font-strong max-w-full [overflow-wrap:anywhere]">{named.name}</p>
      <p className="text-dial-large font-mono">{ideal ? `${theta}°` : dial}</p>
      <p className="text-ink-2">
        {ideal ? (
          'its fast axis on the table'
        ) : (
          <>
            θ <span className="font-mono">{theta}°</span>
          </>
        )}
      </p>
    </div>
  );
}

/** The settings of one to six plates for what is written: the best one drawn, the others a press away. */
export function Dials(props: {
  readonly solved: SolvedTarget;
  readonly plates: readonly NamedPlate[];
  readonly ideal: boolean;
  readonly idealInfidelityHere: number | null;
}) {
  const { solved, plates, ideal, idealInfidelityHere } = props;
  const [chosen, setChosen] = useState(0);
  const [listed, setListed] = useState(false);
  const shown = solved.solutions[chosen] ?? solved.solutions[0];
  if (shown === undefined) return <p>No setting of these plates was found for this.</p>;
  const others = solved.solutions.length - 1;
  return (
    <>
      {/* Name, value and θ of every ring are rows of this one grid, however many lines a name takes. */}
      <div className="mt-4 grid grid-cols-[repeat(auto-fit,minmax(min(9.5rem,100%),1fr))] gap-x-4">
        {plates.map((named, k) => (
          <PlateSetting
            key={`${named.name} ${k}`}
            named={named}
            dialDeg={shown.dialsDeg[k] ?? 0}
            fastAxisDeg={shown.fastAxesDeg[k] ?? 0}
            ideal={ideal}
          />
        ))}
      </div>
      <p className="text-ink-2 mt-4">
        {ideal ? (
          'Exact plates make it exactly.'
        ) : (
          <>
            1 − F expected <Scientific value={shown.expectedInfidelity} />, with every σ.
            {idealInfidelityHere !== null && (
              <>
                {' '}
                Without σ these dials give <Scientific value={shown.dialledInfidelity} />, the angles for
                exact plates of these kinds <Scientific value={idealInfidelityHere} />.
              </>
            )}
          </>
        )}{' '}
        {solved.kind === 'family' && 'Here the plates have a whole family of settings; these stand for it. '}
        {solved.kind === 'nearest' &&
          `Out of reach: the closest that these plates come is ${solved.shortfallDeg.toFixed(2)}° away. `}
        {others > 0 && (
          <TextButton aria-expanded={listed} onClick={() => setListed(!listed)}>
            {countWords[others] ?? String(others)} other {others === 1 ? 'solution' : 'solutions'}
          </TextButton>
        )}
      </p>
      {listed && (
        <OtherSolutions
          solutions={solved.solutions}
          plates={plates}
          ideal={ideal}
          chosen={chosen}
          onChoose={setChosen}
        />
      )}
    </>
  );
}

function OtherSolutions(props: {
  readonly solutions: readonly SettingSolution[];
  readonly plates: readonly NamedPlate[];
  readonly ideal: boolean;
  readonly chosen: number;
  readonly onChoose: (index: number) => void;
}) {
  const { solutions, plates, ideal, chosen, onChoose } = props;
  return (
    <div className="relative overflow-x-auto">
      <table className="mt-3 w-full text-right">
        <thead className="text-s text-ink-2">
          <tr className="border-hair border-b">
            {plates.map(({ name }, k) => (
              <th key={`${name} ${k}`} scope="col" className="py-1 pr-4 font-words whitespace-nowrap">
                {name}, {ideal ? 'θ' : 'dial'}
              </th>
            ))}
            {!ideal && (
              <th scope="col" className="py-1 pr-4 font-words whitespace-nowrap">
                1 − F expected
              </th>
            )}
            <th scope="col" className="py-1 font-words">
              <span className="sr-only">show</span>
            </th>
          </tr>
        </thead>
        <tbody>
          {solutions.map((solution, index) => (
            <tr key={solution.fastAxesDeg.join(' ')} className="border-hair border-b">
              {plates.map(({ name, plate }, k) => (
                <td key={`${name} ${k}`} className="text-dial py-1.5 pr-4 font-mono">
                  {ideal
                    ? `${formatTheta(solution.fastAxesDeg[k] ?? 0)}°`
                    : formatDial(solution.dialsDeg[k] ?? 0, plate.mount.resolutionDeg)}
                </td>
              ))}
              {!ideal && (
                <td className="py-1.5 pr-4">
                  <Scientific value={solution.expectedInfidelity} />
                </td>
              )}
              <td className="py-1.5">
                {index === chosen ? (
                  'drawn'
                ) : (
                  <TextButton onClick={() => onChoose(index)}>
                    Draw it<span className="sr-only">, solution {index + 1}</span>
                  </TextButton>
                )}
              </td>
            </tr>
          ))}
        </tbody>
      </table>
    </div>
  );
}
