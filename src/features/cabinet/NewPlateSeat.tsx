import { type UseFormReturn, useWatch } from 'react-hook-form';
import type { CreatePlate } from '../../../shared/schemas/cabinet';
import { SegmentedChoice } from '../../components/SegmentedChoice';
import { calibrationDoubts } from './calibration-doubts';
import { CalibrationFields } from './CalibrationFields';
import { TextField } from '../../components/TextField';
import { EmptyMountChoice } from './mounts/EmptyMountChoice';
import { MountFields } from './mounts/MountFields';
import type { NewPlateValues } from './new-plate-values';

const seats = [
  { value: 'new-mount', label: 'in a new mount' },
  { value: 'mount', label: 'in an empty mount' },
  { value: 'none', label: 'in none yet' },
] as const;

const times = [
  { value: 'not-yet', label: 'later' },
  { value: 'now', label: 'it was measured here' },
] as const;

/** Where a new plate sits, and what was measured of it there. */
export function NewPlateSeat({
  labId,
  form,
}: {
  readonly labId: string;
  readonly form: UseFormReturn<NewPlateValues, unknown, CreatePlate>;
}) {
  const { register, control, formState, setValue } = form;
  const { errors } = formState;
  const [seat, mountId, drive, direction, calibrates, calibration] = useWatch({
    control,
    name: ['seat', 'mountId', 'mount.drive', 'mount.direction', 'calibrates', 'calibration'],
  });
  return (
    <div className="space-y-8">
      <fieldset className="space-y-4">
        <legend className="text-section mb-3">Its mount</legend>
        <SegmentedChoice
          label="it sits"
          segments={seats}
          value={seat}
          onChange={(chosen) => setValue('seat', chosen, { shouldDirty: true })}
        />
        {seat === 'none' && (
          <p className="text-ink-2">It lies in the tray until it is seated. No bench can use it before.</p>
        )}
        {seat === 'mount' && (
          <EmptyMountChoice
            labId={labId}
            chosenId={mountId}
            onChoose={({ id }) => setValue('mountId', id, { shouldDirty: true, shouldValidate: true })}
            fault={errors.mountId === undefined ? undefined : 'Choose one of the empty mounts.'}
          />
        )}
        {seat === 'new-mount' && (
          <MountFields
            field={(name) => ({ ...register(`mount.${name}`), fault: errors.mount?.[name]?.message })}
            drive={drive}
            onDrive={(chosen) => setValue('mount.drive', chosen, { shouldDirty: true })}
            direction={direction}
            onDirection={(chosen) => setValue('mount.direction', chosen, { shouldDirty: true })}
          />
        )}
        {seat !== 'none' && (
          <TextField
            label="it sits there since (your time)"
            type="datetime-local"
            className="max-w-64"
            help="Empty: since it was measured there, or since now."
            {...register('since')}
            fault={errors.since?.message}
          />
        )}
      </fieldset>
      {seat !== 'none' && (
        <fieldset className="space-y-4">
          <legend className="text-section mb-3">Its first calibration</legend>
          <SegmentedChoice
            label="retardance and zero"
            segments={times}
            value={calibrates}
            onChange={(chosen) => setValue('calibrates', chosen, { shouldDirty: true })}
          />
          {calibrates === 'now' ? (
            <CalibrationFields
              field={(name) => ({
                ...register(`calibration.${name}`),
                fault: errors.calibration?.[name]?.message,
              })}
              question={(name) => register(`calibration.${name}`)}
              doubts={calibrationDoubts(calibration, null)}
            />
          ) : (
            <p className="text-ink-2">
              Its page then offers a scan, or values by hand. No angle of it is known before.
            </p>
          )}
        </fieldset>
      )}
    </div>
  );
}
