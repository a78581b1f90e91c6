import { useMutation, useQueryClient } from '@tanstack/react-query';
import { useForm } from 'react-hook-form';
import type { z } from 'zod';
import { updateLabSchema } from '../../../shared/schemas/labs';
import { Button } from '../../components/Button';
import { sayDone } from '../../components/live-region-store';
import { NumberField } from '../../components/NumberField';
import { SectionHead } from '../../components/SectionHead';
import { TextField } from '../../components/TextField';
import { FormProblem, readTypedNumber, schemaResolver, typedFromNumber } from '../../lib/forms';
import { useLab } from './lab-context';
import { updateLab } from './queries';

interface SettingValues {
  readonly name: string;
  readonly calibrationDueDays: string;
}

const settingsSchema = updateLabSchema.pick({ name: true, calibrationDueDays: true }).required();
type Settings = z.infer<typeof settingsSchema>;

/** The lab's name and its due time. Those who can't change them read them. */
export function LabSettingsSection() {
  const { lab, may } = useLab();
  const queryClient = useQueryClient();
  const { register, formState, handleSubmit, reset } = useForm<SettingValues, unknown, Settings>({
    defaultValues: { name: lab.name, calibrationDueDays: typedFromNumber(lab.calibrationDueDays) },
    resolver: schemaResolver(settingsSchema, (values) => ({
      name: values.name,
      calibrationDueDays: readTypedNumber(values.calibrationDueDays),
    })),
  });
  const saving = useMutation({
    mutationFn: (body: Settings) => updateLab(lab.id, body),
    onSuccess: async (saved) => {
      sayDone('The settings are saved.');
      reset({ name: saved.name, calibrationDueDays: typedFromNumber(saved.calibrationDueDays) });
      await queryClient.invalidateQueries({ queryKey: ['labs', lab.id] });
      await queryClient.invalidateQueries({ queryKey: ['session'] });
    },
  });
  if (!may('lab.settings')) {
    return (
      <section aria-labelledby="settings">
        <SectionHead id="settings" className="mb-3">
          Settings
        </SectionHead>
        <p>A calibration falls due {lab.calibrationDueDays} days after it was measured.</p>
      </section>
    );
  }
  return (
    <section aria-labelledby="settings">
      <SectionHead id="settings" className="mb-3">
        Settings
      </SectionHead>
      <form
        noValidate
        onSubmit={(event) => void handleSubmit((body) => saving.mutate(body))(event)}
        className="grid max-w-xl gap-4 sm:grid-cols-[1fr_14rem]"
      >
        <TextField label="lab’s name" fault={formState.errors.name?.message} {...register('name')} required />
        <NumberField
          label="days until a calibration is due"
          fault={formState.errors.calibrationDueDays?.message}
          {...register('calibrationDueDays')}
          required
        />
        <div className="space-y-2 sm:col-span-2">
          <FormProblem error={saving.error} />
          <Button
            type="submit"
            waitsFor={
              saving.isPending
                ? 'the server'
                : formState.isDirty
                  ? undefined
                  : 'a change of the name or the days'
            }
          >
            Save the settings
          </Button>
        </div>
      </form>
    </section>
  );
}
