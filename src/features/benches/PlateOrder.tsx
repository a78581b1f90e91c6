import { Button } from '../../components/Button';
import { SelectField } from '../../components/SelectField';
import type { Plate } from '../../../shared/schemas/cabinet';
import { kindNames } from '../cabinet';
import type { FieldBinding } from './bench-form-values';

// A list's text can't be drawn with margins, and the faces have this one.
const gap = '\u00a0';

/** What a list says of a plate: enough to pick the right one of two alike. */
export function plateChoice(plate: Plate): string {
  const { retardanceDeg, wavelengthNm } = plate.calibration;
  return `${plate.name}, ${kindNames[plate.kind]}, ${retardanceDeg}° at ${wavelengthNm}${gap}nm`;
}

/** The two places in the beam, each with its plate, and a way to change them round without a drag. */
export function PlateOrder(props: {
  readonly plates: readonly Plate[];
  readonly first: FieldBinding;
  readonly second: FieldBinding;
  readonly onSwap: () => void;
}) {
  const { plates, first, second, onSwap } = props;
  const options = plates.map((plate) => ({ value: plate.id, label: plateChoice(plate) }));
  return (
    <fieldset className="space-y-4">
      <legend className="text-section">Plates in beam order</legend>
      <SelectField
        label="light meets first"
        placeholder="choose a plate"
        options={options}
        {...first}
        required
      />
      <SelectField label="then" placeholder="choose a plate" options={options} {...second} required />
      <Button onClick={onSwap}>Change them round</Button>
    </fieldset>
  );
}
