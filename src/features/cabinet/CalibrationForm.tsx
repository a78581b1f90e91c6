import { useMutation, useQueryClient } from '@tanstack/react-query';
import { useRef, useState } from 'react';
import { useForm, useWatch } from 'react-hook-form';
import type { CabinetPlate } from '../../../shared/schemas/cabinet';
import { type CalibrationInput, calibrationInputSchema } from '../../../shared/schemas/calibrations';
import { Button } from '../../components/Button';
import { sayDone } from '../../components/live-region-store';
import {
  FormProblem,
  LeaveAsItWas,
  LeaveForm,
  schemaResolver,
  showServerFaults,
  useIdempotencyKey,
} from '../../lib/forms';
import { calibrationDoubts } from './calibration-doubts';
import { CalibrationFields } from './CalibrationFields';
import {
  type CalibrationValues,
  emptyCalibration,
  questionFields,
  readCalibration,
} from './calibration-form-values';
import { measuredAtFault } from '../../lib/measured-at-fault';
import { questionWords } from './plate-words';
import { recordCalibration } from './queries';

/** What was measured of a plate in its present seat. It stands from then on; a correction is another one. */
export function CalibrationForm(props: {
  readonly labId: string;
  readonly plate: CabinetPlate;
  readonly onDone: () => void;
}) {
  const { labId, plate, onDone } = props;
  const [opened] = useState(() => new Date());
  const queryClient = useQueryClient();
  const isDoneRef = useRef(false);
  const keyFor = useIdempotencyKey();
  const standing = plate.calibration;
  const { register, control, formState, handleSubmit, setError } = useForm<
    CalibrationValues,
    unknown,
    CalibrationInput
  >({
    defaultValues: emptyCalibration(standing ?? { wavelengthNm: plate.designWavelengthNm }, opened),
    resolver: schemaResolver(
      calibrationInputSchema,
      (values: CalibrationValues) => readCalibration(values, standing),
      {
        alsoWrong: ({ measuredAt }) => {
          const message = measuredAtFault(measuredAt, plate.seat?.seatedAt ?? null, new Date());
          return message === null ? [] : [{ field: 'measuredAt', message }];
        },
      },
    ),
    mode: 'onTouched',
  });
  const recording = useMutation({
    mutationFn: (body: CalibrationInput) => recordCalibration(labId, plate.id, body, keyFor(body)),
    onSuccess: async () => {
      isDoneRef.current = true;
      sayDone(`The calibration of ${plate.name} is recorded.`);
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
  const settled = (standing?.openQuestions ?? []).filter(
    (question) => typed[questionFields[question]] !== true,
  );
  return (
    <form
      noValidate
      onSubmit={(event) => void handleSubmit((body) => recording.mutate(body))(event)}
      className="space-y-4"
    >
      <CalibrationFields
        field={(name) => ({ ...register(name), fault: formState.errors[name]?.message })}
        question={(name) => register(name)}
        doubts={calibrationDoubts(typed, standing)}
      />
      {settled.length > 0 && (
        <p role="status">
          Recorded so, it settles what the last one left open:{' '}
          {settled.map((question) => questionWords[question]).join(', ')}. Tick it above if it does not.
        </p>
      )}
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
        <LeaveAsItWas isDoneRef={isDoneRef} onLeave={onDone} />
      </div>
      <LeaveForm isDirty={formState.isDirty} isDoneRef={isDoneRef} what="the calibration" />
    </form>
  );
}
