import { type Control, useFieldArray, type UseFormRegister } from 'react-hook-form';
import { maxBenchPlates } from '../../../shared/schemas/benches';
import type { Plate } from '../../../shared/schemas/cabinet';
import { Button } from '../../components/Button';
import { SelectField } from '../../components/SelectField';
import { kindNames } from '../cabinet';
import type { CreateBench } from '../../../shared/schemas/benches';
import type { BenchValues } from './bench-form-values';

// A list's text can't be drawn with margins, and the faces have this one.
const gap = '\u00a0';

/** What a list says of a plate: enough to pick the right one of two alike. */
function plateChoice(plate: Plate, benchId: string | null): string {
  const { retardanceDeg, wavelengthNm } = plate.calibration;
  const others = plate.benches.filter(({ id }) => id !== benchId).map(({ name }) => name);
  const stands = others.length === 0 ? '' : `, stands in ${others.join(' and ')}`;
  return `${plate.name}, ${kindNames[plate.kind]}, ${retardanceDeg}° at ${wavelengthNm}${gap}nm${stands}`;
}

/** The places in the beam, one to six, each with its plate; moved, added and taken out by buttons, without a drag. */
export function PlateOrder(props: {
  readonly plates: readonly Plate[];
  /** The bench that is edited, whose own plates are no one else's; null for a new one. */
  readonly benchId: string | null;
  readonly control: Control<BenchValues, unknown, CreateBench>;
  readonly register: UseFormRegister<BenchValues>;
  readonly fault: string | undefined;
}) {
  const { plates, benchId, control, register, fault } = props;
  const { fields, append, move, remove } = useFieldArray({ control, name: 'plates' });
  const options = plates.map((plate) => ({ value: plate.id, label: plateChoice(plate, benchId) }));
  return (
    <fieldset className="space-y-4">
      <legend className="text-section">Plates in beam order</legend>
      {fields.map(({ id }, place) => (
        <div key={id} className="flex flex-wrap items-end gap-2">
          <SelectField
            className="min-w-0 grow basis-64"
            label={place === 0 ? 'light meets first' : `then, ${place + 1}`}
            placeholder="choose a plate"
            options={options}
            {...register(`plates.${place}.plateId`)}
          />
          {fields.length > 1 && (
            <>
              <Button
                onClick={() => move(place, place === 0 ? place + 1 : place - 1)}
                aria-label={place === 0 ? 'Move the first plate later' : `Move plate ${place + 1} earlier`}
              >
                {place === 0 ? 'Later' : 'Earlier'}
              </Button>
              <Button onClick={() => remove(place)} aria-label={`Take out plate ${place + 1}`}>
                Take out
              </Button>
            </>
          )}
        </div>
      ))}
      {fault !== undefined && (
        <p role="alert" className="text-fault font-strong">
          {fault}
        </p>
      )}
      {fields.length < maxBenchPlates && (
        <Button onClick={() => append({ plateId: '' })}>Add a plate behind them</Button>
      )}
    </fieldset>
  );
}
