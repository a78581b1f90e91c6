import { useMutation, useQueryClient } from '@tanstack/react-query';
import { useForm, useWatch } from 'react-hook-form';
import type { CalibrationInput, Plate } from '../../../shared/schemas/cabinet';
import { Button } from '../../components/Button';
import { FormProblem, schemaResolver, showServerFaults, useIdempotencyKey } from '../../lib/forms';
import { calibrationDoubts } from './calibration-doubts';
import { CalibrationFields } from './CalibrationFields';
import {
  calibrationFormSchema,
  type CalibrationValues,
  emptyCalibration,
  readCalibration,
} from './plate-form-values';
import { recordCalibration } from './queries';

/** What was measured of a plate in its present seat. It stands from then on; a correction is another one. */
export function CalibrationForm(props: {
  readonly labId: string;
  readonly plate: Plate;
  readonly now: Date;
  readonly onDone: () => void;
}) {
  const { labId, plate, now, onDone } = props;
  const queryClient = useQueryClient();
  const keyFor = useIdempotencyKey();
  const { register, control, formState, handleSubmit, setError } = useForm<
    CalibrationValues,
    unknown,
    CalibrationInput
  >({
    defaultValues: emptyCalibration(plate.calibration, now),
    resolver: schemaResolver(calibrationFormSchema, readCalibration),
    mode: 'onTouched',
  });
  const recording = useMutation({
    mutationFn: (body: CalibrationInput) => recordCalibration(labId, plate.id, body, keyFor(body)),
    onSuccess: async () => {
      await queryClient.invalidateQueries({ queryKey: ['labs', labId] });
      onDone();
    },
    onError: (error) => {
      // Said at the fields, it need not be said under the form.
      if (showServerFaults(error, setError, (path) => (path === 'measuredAt' ? path : null)))
        recording.reset();
    },
  });
  const typed = useWatch({ control });
  const relying = plate.benches.map(({ name }) => name).join(' and ');
  return (
    <form
      noValidate
      onSubmit={(event) => void handleSubmit((body) => recording.mutate(body))(event)}
      className="space-y-4"
    >
      <CalibrationFields
        field={(name) => ({ ...register(name), fault: formState.errors[name]?.message })}
        doubts={calibrationDoubts(typed, plate.calibration)}
      />
      <p className="text-s text-ink-2">
        It cannot be changed afterwards; a correction is another one.
        {relying === ''
          ? ''
          : ` Drafts for ${relying} solve with it at once; versions keep the one they were saved with.`}
      </p>
      <FormProblem error={recording.error} />
      <div className="flex flex-wrap gap-3">
        <Button kind="filled" type="submit" waitsFor={recording.isPending ? 'the server' : undefined}>
          Record the calibration
        </Button>
        <Button onClick={onDone}>Leave it as it was</Button>
      </div>
    </form>
  );
}
