import { useMutation, useQueryClient } from '@tanstack/react-query';
import { useRef, useState } from 'react';
import { useForm, useWatch } from 'react-hook-form';
import { type CabinetPlate, type UpdatePlate, updatePlateSchema } from '../../../shared/schemas/cabinet';
import { Button } from '../../components/Button';
import { sayDone } from '../../components/live-region-store';
import {
  conflictingState,
  EditConflict,
  FormProblem,
  LeaveAsItWas,
  LeaveForm,
  schemaResolver,
  showServerFaults,
} from '../../lib/forms';
import { plateConflict, plateDifferences } from './plate-conflict';
import { plateFieldOf, type PlateValues, readPlate, valuesOfPlate } from './plate-form-values';
import { PlateFields } from './PlateFields';
import { updatePlate } from './queries';

/** A plate's own facts. Its mount has a page of its own, and what was measured is another calibration. */
export function EditPlateForm(props: {
  readonly labId: string;
  readonly plate: CabinetPlate;
  readonly onDone: () => void;
}) {
  const { labId, plate, onDone } = props;
  const queryClient = useQueryClient();
  const isDoneRef = useRef(false);
  // What this form was filled from. A refetch behind it must not make an old form look new.
  const [baseRevision, setBaseRevision] = useState(plate.revision);
  const { register, control, formState, handleSubmit, setError, getValues, reset } = useForm<
    PlateValues,
    unknown,
    UpdatePlate
  >({
    defaultValues: valuesOfPlate(plate),
    resolver: schemaResolver(updatePlateSchema, readPlate, { fieldOf: plateFieldOf }),
    mode: 'onTouched',
  });
  const construction = useWatch({ control, name: 'construction' });
  const saving = useMutation({
    mutationFn: ({ body, revision }: { body: UpdatePlate; revision: number }) =>
      updatePlate(labId, plate.id, body, revision),
    onSuccess: async (saved) => {
      isDoneRef.current = true;
      sayDone(`${saved.name} is saved.`);
      await queryClient.invalidateQueries({ queryKey: ['labs', labId] });
      onDone();
    },
    onError: (error) => {
      // Said at the fields, it need not be said under the form.
      if (showServerFaults(error, setError, (path) => (path === 'name' ? path : null))) saving.reset();
    },
  });
  const submit = (revision: number) => handleSubmit((body) => saving.mutate({ body, revision }));
  const theirs = plateConflict(conflictingState(saving.error));
  return (
    <form noValidate onSubmit={(event) => void submit(baseRevision)(event)} className="space-y-4">
      <PlateFields
        field={(name) => ({ ...register(name), fault: formState.errors[name]?.message })}
        isMultiOrder={construction === 'multi-order'}
      />
      {theirs === null ? (
        <FormProblem error={saving.error} />
      ) : (
        <EditConflict
          name={theirs.name}
          differences={plateDifferences(theirs, getValues())}
          onKeepYours={() => void submit(theirs.revision)()}
          onTakeTheirs={() => {
            reset(valuesOfPlate(theirs));
            setBaseRevision(theirs.revision);
            saving.reset();
            void queryClient.invalidateQueries({ queryKey: ['labs', labId] });
          }}
        />
      )}
      {theirs === null && (
        <div className="flex flex-wrap gap-3">
          <Button kind="filled" type="submit" waitsFor={saving.isPending ? 'the server' : undefined}>
            Save {plate.name}
          </Button>
          <LeaveAsItWas isDoneRef={isDoneRef} onLeave={onDone} />
        </div>
      )}
      <LeaveForm isDirty={formState.isDirty} isDoneRef={isDoneRef} what={plate.name} />
    </form>
  );
}
