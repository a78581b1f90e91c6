import type { ProtocolKind } from '../../../../shared/schemas/protocols';
import { NumberField } from '../../../components/NumberField';
import { SegmentedChoice } from '../../../components/SegmentedChoice';
import { SelectField } from '../../../components/SelectField';
import { TextField } from '../../../components/TextField';
import { type ChosenSet, type SetChoice, setNames } from './target-set-choice';

interface SetFieldsProps {
  readonly kind: ProtocolKind;
  readonly choice: SetChoice;
  readonly chosen: ChosenSet;
  readonly onChange: (choice: SetChoice) => void;
}

/** Which set, and the little that it needs to be told. */
export function SetFields({ kind, choice, chosen, onChange }: SetFieldsProps) {
  const set = (change: Partial<SetChoice>) => onChange({ ...choice, ...change });
  const faultOf = (field: string) => (!chosen.ok && chosen.field === field ? chosen.sentence : undefined);
  const drawn = choice.name === 'haar' || choice.name === 'haar-unitaries';
  return (
    <div className="grid gap-4">
      <SelectField
        label="set"
        value={choice.name}
        options={setNames[kind]}
        onChange={(event) => {
          const next = setNames[kind].find(({ value }) => value === event.target.value);
          if (next !== undefined) set({ name: next.value });
        }}
      />
      {choice.name === 'tetrahedron' && (
        <SegmentedChoice
          label="stands"
          value={choice.orientation}
          onChange={(orientation) => set({ orientation })}
          segments={[
            { value: 'one at H', label: 'with one corner at H' },
            { value: 'corners of a cube', label: 'on corners of a cube' },
          ]}
        />
      )}
      {choice.name === 'two-bases' && (
        <SegmentedChoice
          label="bases"
          value={choice.pair}
          onChange={(pair) => set({ pair })}
          segments={[
            { value: 'HV/DA', label: 'H V, D A' },
            { value: 'HV/RL', label: 'H V, R L' },
            { value: 'DA/RL', label: 'D A, R L' },
          ]}
        />
      )}
      {choice.name === 'great-circle' && (
        <>
          <TextField
            label="pole of the circle"
            mono
            help="equator is all linear light; else a state, such as H or linear(30deg)."
            value={choice.pole}
            fault={faultOf('pole')}
            onChange={(event) => set({ pole: event.target.value })}
          />
          <NumberField
            label="first state, turned on by, table degrees"
            help="On the equator its azimuth; once round is 180."
            value={choice.startAzimuthDeg}
            fault={faultOf('startAzimuthDeg')}
            onChange={(event) => set({ startAzimuthDeg: event.target.value })}
          />
        </>
      )}
      {(choice.name === 'great-circle' || drawn) && (
        <NumberField
          label="how many"
          className="max-w-40"
          value={choice.count}
          fault={faultOf('count')}
          onChange={(event) => set({ count: event.target.value })}
        />
      )}
      {drawn && (
        <NumberField
          label="seed"
          help="The same seed gives the same rows, anywhere."
          className="max-w-60"
          value={choice.seed}
          fault={faultOf('seed')}
          onChange={(event) => set({ seed: event.target.value })}
        />
      )}
    </div>
  );
}
