import { useMutation, useQueryClient } from '@tanstack/react-query';
import { useForm, useWatch } from 'react-hook-form';
import type { z } from 'zod';
import { type CreatePlate, createPlateSchema, type Plate } from '../../../shared/schemas/cabinet';
import { Button } from '../../components/Button';
import { FormProblem, schemaResolver, showServerFaults, useIdempotencyKey } from '../../lib/forms';
import { calibrationDoubts } from './calibration-doubts';
import { CalibrationFields } from './CalibrationFields';
import {
  calibrationFormSchema,
  type CalibrationValues,
  emptyCalibration,
  emptyPlate,
  plateFieldOf,
  type PlateValues,
  readCalibration,
  readPlate,
} from './plate-form-values';
import { PlateFields } from './PlateFields';
import { plateFault } from './plate-fault';
import { createPlate } from './queries';

interface NewPlateValues extends PlateValues {
  readonly calibration: CalibrationValues;
}

const newPlateSchema: z.ZodType<CreatePlate> = createPlateSchema.safeExtend({
  calibration: calibrationFormSchema,
});

/** The two things that only the server can see. */
function fieldOf(path: string): 'name' | 'calibration.measuredAt' | null {
  return path === 'name' || path === 'calibration.measuredAt' ? path : null;
}

/** A plate that comes into the cabinet: what it is, the mount it sits in, and its first calibration, without which no angle is known. */
export function NewPlateForm(props: {
  readonly labId: string;
  readonly now: Date;
  readonly onCreated: (plate: Plate) => void;
  readonly onLeave: () => void;
}) {
  const { labId, now, onCreated, onLeave } = props;
  const queryClient = useQueryClient();
  const keyFor = useIdempotencyKey();
  const { register, control, formState, handleSubmit, setValue, setError } = useForm<
    NewPlateValues,
    unknown,
    CreatePlate
  >({
    defaultValues: { ...emptyPlate, calibration: emptyCalibration(null, now) },
    resolver: schemaResolver(
      newPlateSchema,
      (values) => ({
        ...readPlate(values),
        calibration: readCalibration(values.calibration),
      }),
      plateFieldOf,
    ),
    mode: 'onTouched',
  });
  const direction = useWatch({ control, name: 'mount.direction' });
  const construction = useWatch({ control, name: 'construction' });
  const calibration = useWatch({ control, name: 'calibration' });
  const creating = useMutation({
    mutationFn: (body: CreatePlate) => createPlate(labId, body, keyFor(body)),
    onSuccess: async (plate) => {
      await queryClient.invalidateQueries({ queryKey: ['labs', labId] });
      onCreated(plate);
    },
    onError: (error) => {
      // Said at the fields, it need not be said under the form.
      if (showServerFaults(error, setError, fieldOf)) creating.reset();
    },
  });
  const { errors } = formState;
  return (
    <form noValidate onSubmit={(event) => void handleSubmit((body) => creating.mutate(body))(event)}>
      <div className="grid grid-cols-1 gap-x-14 gap-y-8 lg:grid-cols-2">
        <fieldset>
          <legend className="text-section mb-3">The plate and its mount</legend>
          <PlateFields
            field={(name) => ({ ...register(name), fault: plateFault(errors, name) })}
            isMultiOrder={construction === 'multi-order'}
            direction={direction}
            onDirection={(chosen) => setValue('mount.direction', chosen, { shouldDirty: true })}
          />
        </fieldset>
        <fieldset>
          <legend className="text-section mb-3">Its first calibration</legend>
          <CalibrationFields
            field={(name) => ({
              ...register(`calibration.${name}`),
              fault: errors.calibration?.[name]?.message,
            })}
            doubts={calibrationDoubts(calibration, null)}
          />
        </fieldset>
      </div>
      <div className="mt-6 space-y-3">
        <FormProblem error={creating.error} />
        <div className="flex flex-wrap gap-3">
          <Button kind="filled" type="submit" waitsFor={creating.isPending ? 'the server' : undefined}>
            Add the plate
          </Button>
          <Button onClick={onLeave}>Leave it as it was</Button>
        </div>
      </div>
    </form>
  );
}
