import { useState } from 'react';
import {
  DataCell,
  DataRow,
  DataTable,
  HeadCell,
  LitEdge,
  RowHead,
  TableHead,
} from '../../components/DataTable';
import { Scientific } from '../../components/Scientific';
import { TextButton } from '../../components/TextLink';
import { GapText } from '../../lib/GapText';
import { formatDial, formatTheta } from '../../lib/format';
import type { ListedSetting } from './design';
import { effectWords, ratioWords } from './design-words';
import type { AskedPlate } from './robust-question';

interface SettingsTableProps {
  readonly settings: readonly ListedSetting[];
  readonly plates: readonly AskedPlate[];
  readonly plainAverage: number;
  /** "±10 %". */
  readonly range: string;
  readonly selected: number | null;
  readonly onSelect: (number: number) => void;
}

const SHOWN_FIRST = 8;

/** What was found, the least average first: the angles, what they do about the error, and what that is worth. */
export function SettingsTable(props: SettingsTableProps) {
  const { settings, plates, plainAverage, range, selected, onSelect } = props;
  const [all, setAll] = useState(false);
  const shown = all ? settings : settings.slice(0, SHOWN_FIRST);
  return (
    <>
      <DataTable caption="Composite settings found, the least average 1 − F first">
        <TableHead>
          <tr>
            <HeadCell className="max-md:hidden">setting</HeadCell>
            <HeadCell className="pl-0! md:hidden">setting, angles</HeadCell>
            {plates.map(({ name, scale }, k) => (
              <HeadCell key={`${name} ${k}`} numeric className="max-md:hidden">
                <span className="font-strong text-ink">{name}</span> {scale === null ? 'θ' : 'dial θ'}
              </HeadCell>
            ))}
            <HeadCell className="max-md:hidden md:pl-6">about the error it</HeadCell>
            <HeadCell numeric className="font-words max-md:hidden">
              1 − F at none
            </HeadCell>
            <HeadCell numeric className="max-sm:hidden">
              average <span className="whitespace-nowrap">1 − F</span> over <GapText text={range} />
            </HeadCell>
            <HeadCell numeric>
              <span className="sm:hidden">average 1 − F, </span>against plain
            </HeadCell>
          </tr>
        </TableHead>
        <tbody>
          {shown.map((setting) => (
            <SettingRow
              key={setting.number}
              setting={setting}
              plates={plates}
              plainAverage={plainAverage}
              selected={setting.number === selected}
              onSelect={() => onSelect(setting.number)}
            />
          ))}
        </tbody>
      </DataTable>
      {settings.length > SHOWN_FIRST && (
        <p className="mt-2 text-s">
          <TextButton aria-expanded={all} onClick={() => setAll(!all)}>
            {all ? `Only the first ${SHOWN_FIRST}` : `All ${settings.length} settings`}
          </TextButton>
        </p>
      )}
    </>
  );
}

interface SettingRowProps {
  readonly setting: ListedSetting;
  readonly plates: readonly AskedPlate[];
  readonly plainAverage: number;
  readonly selected: boolean;
  readonly onSelect: () => void;
}

function SettingRow({ setting, plates, plainAverage, selected, onSelect }: SettingRowProps) {
  const { number, fastAxesDeg, dialsDeg, robustness, meetsGoal, isOneOfFamily } = setting;
  return (
    <DataRow selected={selected} onClick={onSelect} className="cursor-pointer">
      <RowHead className="pl-3!">
        {selected && <LitEdge />}
        <button
          type="button"
          className="min-h-6 min-w-6 text-left font-strong"
          aria-pressed={selected}
          onClick={onSelect}
        >
          {number}
          <span className="sr-only">, look at it</span>
        </button>
        <span className="mt-1 block font-words md:hidden">
          <Angles plates={plates} fastAxesDeg={fastAxesDeg} dialsDeg={dialsDeg} />
          <span className="mt-1 block text-s text-ink-2">
            <EffectNote {...{ robustness, isOneOfFamily, meetsGoal }} />
          </span>
        </span>
      </RowHead>
      {plates.map(({ name, scale }, k) => (
        <DataCell key={`${name} ${k}`} numeric className="max-md:hidden">
          {scale === null || dialsDeg === null ? (
            <span className="text-[1.0625rem] font-strong">{formatTheta(fastAxesDeg[k] ?? null)}°</span>
          ) : (
            <>
              <span className="text-[1.0625rem] font-strong">
                {formatDial(dialsDeg[k] ?? null, scale.resolutionDeg)}
              </span>{' '}
              <span className="text-s text-ink-2">{formatTheta(fastAxesDeg[k] ?? null)}</span>
            </>
          )}
        </DataCell>
      ))}
      <DataCell className="max-md:hidden md:pl-6">
        <EffectNote {...{ robustness, isOneOfFamily, meetsGoal }} />
      </DataCell>
      <DataCell numeric className="max-md:hidden">
        {meetsGoal ? '0' : <Scientific value={robustness.infidelityAtZero} />}
      </DataCell>
      <DataCell numeric className="max-sm:hidden">
        <Scientific value={robustness.averageInfidelity} />
      </DataCell>
      <DataCell className="text-right">
        <span className="block sm:hidden">
          <Scientific value={robustness.averageInfidelity} />
        </span>
        <GapText text={ratioWords(robustness.averageInfidelity, plainAverage)} />
      </DataCell>
    </DataRow>
  );
}

function EffectNote(props: Pick<ListedSetting, 'robustness' | 'isOneOfFamily' | 'meetsGoal'>) {
  return (
    <>
      {effectWords(props.robustness)}
      {!props.meetsGoal && <span className="text-s text-ink-2">, misses at no error</span>}
      {props.isOneOfFamily && <span className="text-s text-ink-2">, one of a family</span>}
    </>
  );
}

/** All plates in one cell, for a narrow page. */
function Angles(
  props: Pick<ListedSetting, 'fastAxesDeg' | 'dialsDeg'> & { readonly plates: readonly AskedPlate[] },
) {
  const { plates, fastAxesDeg, dialsDeg } = props;
  return (
    <span className="flex flex-wrap gap-x-3 gap-y-0.5">
      {plates.map(({ name, scale }, k) => (
        <span key={`${name} ${k}`} className="whitespace-nowrap">
          {scale !== null && <span className="text-s text-ink-2">{name} </span>}
          <span className="font-mono font-strong">
            {scale === null || dialsDeg === null
              ? `${formatTheta(fastAxesDeg[k] ?? null)}°`
              : formatDial(dialsDeg[k] ?? null, scale.resolutionDeg)}
          </span>
        </span>
      ))}
    </span>
  );
}
