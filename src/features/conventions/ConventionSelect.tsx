import { CONVENTION_SETS, describeConvention, sameConvention } from '../../../shared/optics';
import { SelectField } from '../../components/SelectField';
import { chosenCode, chosenOf, flagCode } from './address';
import type { Chosen, OwnConvention } from './compared-rows';
import { EVERY_CONVENTION, flagWords } from './flag-words';

interface ConventionSelectProps {
  readonly chosen: Chosen;
  readonly own: OwnConvention | null;
  readonly fault: string | undefined;
  readonly onChange: (chosen: Chosen) => void;
}

/** In which convention it is typed: one's own, a published set's, or bare flags that no set has. */
export function ConventionSelect({ chosen, own, fault, onChange }: ConventionSelectProps) {
  const ownCode = own === null ? null : flagCode(own.convention);
  const bare = EVERY_CONVENTION.filter((convention) => {
    if (flagCode(convention) === ownCode) return false;
    const isChosen = chosen.setId === null && sameConvention(convention, chosen.convention);
    return isChosen || CONVENTION_SETS.every((set) => !sameConvention(set.convention, convention));
  });
  const options = [
    ...(own === null || ownCode === null
      ? []
      : [{ value: ownCode, label: `your lab, ${own.name}: ${flagWords(own.convention)}` }]),
    ...CONVENTION_SETS.map(({ id, name, convention }) => ({
      value: id,
      label: `${name}: ${flagWords(convention)}`,
    })),
    ...bare.map((convention) => ({
      value: flagCode(convention),
      label: `no set, only flags: ${flagWords(convention)}`,
    })),
  ];
  return (
    <SelectField
      label="typed in the convention of"
      value={chosenCode(chosen)}
      options={options}
      help={describeConvention(chosen.convention)}
      fault={fault}
      onChange={(event) => {
        const next = chosenOf(event.target.value);
        if (next !== null) onChange(next);
      }}
    />
  );
}
