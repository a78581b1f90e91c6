import { useMutation, useQueryClient } from '@tanstack/react-query';
import { useRef } from 'react';
import { useForm, useWatch } from 'react-hook-form';
import { type CabinetPlate, type CreatePlate, createPlateSchema } from '../../../shared/schemas/cabinet';
import { Button } from '../../components/Button';
import { sayDone } from '../../components/live-region-store';
import {
  FormProblem,
  LeaveAsItWas,
  LeaveForm,
  isoFromOptionalField,
  schemaResolver,
  showServerFaults,
  useIdempotencyKey,
} from '../../lib/forms';
import { emptyNewPlate, newPlateFieldOf, type NewPlateValues, readNewPlate } from './new-plate-values';
import { measuredAtFault } from '../../lib/measured-at-fault';
import { NewPlateSeat } from './NewPlateSeat';
import { PlateFields } from './PlateFields';
import { createPlate } from './queries';

/** What the server will refuse, said beside what the schema does. */
function measuredFaults({ seat, since, calibrates, calibration }: NewPlateValues) {
  const message =
    seat === 'none' || calibrates === 'not-yet'
      ? null
      : measuredAtFault(calibration.measuredAt, isoFromOptionalField(since), new Date());
  return message === null ? [] : [{ field: 'calibration.measuredAt' as const, message }];
}

/** A plate that comes into the cabinet: what it is, where it sits, and what was measured of it there, as far as there is any. */
export function NewPlateForm(props: {
  readonly labId: string;
  readonly now: Date;
  readonly onCreated: (plate: CabinetPlate) => void;
  readonly onLeave: () => void;
}) {
  const { labId, now, onCreated, onLeave } = props;
  const queryClient = useQueryClient();
  const isDoneRef = useRef(false);
  const keyFor = useIdempotencyKey();
  const form = useForm<NewPlateValues, unknown, CreatePlate>({
    defaultValues: emptyNewPlate(now),
    resolver: schemaResolver(createPlateSchema, readNewPlate, {
      fieldOf: newPlateFieldOf,
      alsoWrong: measuredFaults,
    }),
    mode: 'onTouched',
  });
  const { register, control, formState, handleSubmit, setError } = form;
  const construction = useWatch({ control, name: 'plate.construction' });
  const creating = useMutation({
    mutationFn: (body: CreatePlate) => createPlate(labId, body, keyFor(body)),
    onSuccess: async (plate) => {
      isDoneRef.current = true;
      sayDone(`${plate.name} is in the cabinet.`);
      await queryClient.invalidateQueries({ queryKey: ['labs', labId] });
      onCreated(plate);
    },
    onError: (error) => {
      // Said at the fields, it need not be said under the form.
      if (showServerFaults(error, setError, newPlateFieldOf)) creating.reset();
    },
  });
  return (
    <form noValidate onSubmit={(event) => void handleSubmit((body) => creating.mutate(body))(event)}>
      <div className="grid grid-cols-1 gap-x-14 gap-y-8 lg:grid-cols-2">
        <fieldset>
          <legend className="text-section mb-3">The plate</legend>
          <PlateFields
            field={(name) => ({
              ...register(`plate.${name}`),
              fault: formState.errors.plate?.[name]?.message,
            })}
            isMultiOrder={construction === 'multi-order'}
          />
        </fieldset>
        <NewPlateSeat labId={labId} form={form} />
      </div>
      <div className="mt-6 space-y-3">
        <FormProblem error={creating.error} />
        <div className="flex flex-wrap gap-3">
          <Button kind="filled" type="submit" waitsFor={creating.isPending ? 'the server' : undefined}>
            Add the plate
          </Button>
          <LeaveAsItWas isDoneRef={isDoneRef} onLeave={onLeave} />
        </div>
      </div>
      <LeaveForm isDirty={formState.isDirty} isDoneRef={isDoneRef} what="the new plate" />
    </form>
  );
}
