import { useMutation, useQueryClient } from '@tanstack/react-query';
import { useState } from 'react';
import { useForm, useWatch } from 'react-hook-form';
import type { Bench, CreateBench } from '../../../shared/schemas/benches';
import { createBenchSchema } from '../../../shared/schemas/benches';
import type { Plate } from '../../../shared/schemas/cabinet';
import { Button, ButtonLink } from '../../components/Button';
import { NumberField } from '../../components/NumberField';
import { SelectField } from '../../components/SelectField';
import { TextField } from '../../components/TextField';
import {
  conflictingState,
  EditConflict,
  FormProblem,
  readOptionalNumber,
  readTypedNumber,
  schemaResolver,
  showServerFaults,
} from '../../lib/forms';
import { useLab } from '../labs';
import { GapText } from '../../lib/GapText';
import { benchConflict, benchDifferences } from './bench-conflict';
import {
  type BenchValues,
  classOptions,
  emptyBench,
  eyewearWavelengths,
  type FieldBinding,
  readBench,
  readLaserClass,
  valuesOfBench,
} from './bench-form-values';
import { benchWarnings } from './bench-warnings';
import { inputFault, InputReading } from './InputReading';
import { LaserCaution } from './LaserCaution';
import { PlateOrder } from './PlateOrder';

/** A part of the request whose field has another name in the form. */
function fieldOf(path: string): keyof BenchValues | null {
  if (path === 'name' || path === 'inputExpression') return path;
  if (path.startsWith('hazardWavelengthsNm')) return 'hazardWavelengthsNm';
  return path.startsWith('plateIds') ? 'plates' : null;
}

/** A new bench, or one that is edited. `save` gets the request and the revision it was made against. */
export function BenchForm(props: {
  readonly bench: Bench | null;
  readonly plates: readonly Plate[];
  readonly save: (body: CreateBench, revision: number) => Promise<Bench>;
  readonly onSaved: (bench: Bench) => void;
}) {
  const { bench, plates, save, onSaved } = props;
  const { lab } = useLab();
  const queryClient = useQueryClient();
  // What this form was filled from. A refetch behind it must not make an old form look new.
  const [baseRevision, setBaseRevision] = useState(bench?.revision ?? 0);
  const { register, control, formState, handleSubmit, setError, getValues, reset } = useForm<
    BenchValues,
    unknown,
    CreateBench
  >({
    defaultValues: bench === null ? emptyBench : valuesOfBench(bench),
    resolver: schemaResolver(createBenchSchema, readBench, fieldOf),
    mode: 'onTouched',
  });
  const values = useWatch({ control });
  const saving = useMutation({
    mutationFn: ({ body, revision }: { body: CreateBench; revision: number }) => save(body, revision),
    onSuccess: async (saved) => {
      await queryClient.invalidateQueries({ queryKey: ['labs', lab.id] });
      onSaved(saved);
    },
    onError: (error) => {
      // Said at the fields, it need not be said under the form.
      if (showServerFaults(error, setError, fieldOf)) saving.reset();
    },
  });
  const submit = (revision: number) => (body: CreateBench) => {
    const fault = inputFault(body.inputExpression, lab.convention);
    if (fault === null) saving.mutate({ body, revision });
    else setError('inputExpression', { type: 'expression', message: fault }, { shouldFocus: true });
  };
  const field = (name: Exclude<keyof BenchValues, 'plates'>): FieldBinding => ({
    ...register(name),
    fault: formState.errors[name]?.message,
  });
  const wavelengthNm = readTypedNumber(values.wavelengthNm ?? '');
  const typedC = readOptionalNumber(values.temperatureC ?? '');
  const temperatureC = Number.isFinite(typedC) ? typedC : null;
  const chosen = (values.plates ?? []).flatMap(
    ({ plateId }) => plates.find((plate) => plate.id === plateId) ?? [],
  );
  const warnings = benchWarnings(chosen, { wavelengthNm, temperatureC }, bench?.id ?? null);
  const theirs = benchConflict(conflictingState(saving.error));
  const hazards = eyewearWavelengths(values.hazardWavelengthsNm ?? '');
  return (
    <form
      noValidate
      onSubmit={(event) => void handleSubmit(submit(baseRevision))(event)}
      className="grid grid-cols-1 gap-x-12 gap-y-8 lg:grid-cols-2"
    >
      <div className="space-y-4">
        <TextField label="bench’s name" {...field('name')} required />
        <div className="grid gap-4 sm:grid-cols-2">
          <NumberField label="wavelength, nm" {...field('wavelengthNm')} required />
          <NumberField
            label="its σ, nm"
            help="0 leaves it out of the budget."
            {...field('wavelengthSigmaNm')}
            required
          />
          <NumberField
            label="temperature of the plates, °C"
            help="Empty where nobody watches it."
            {...field('temperatureC')}
          />
          <NumberField label="its σ, K" {...field('temperatureSigmaK')} required />
        </div>
        <TextField
          label="state behind the polariser"
          mono
          help={<InputReading expression={values.inputExpression ?? ''} convention={lab.convention} />}
          {...field('inputExpression')}
          fault={
            formState.errors.inputExpression?.message ??
            inputFault(values.inputExpression ?? '', lab.convention)
          }
          required
        />
        <NumberField
          label="σ of the polariser’s angle, degrees"
          help="0 if it is what every angle is counted from."
          {...field('polariserSigmaDeg')}
          required
        />
        <NumberField
          label="extinction of the polariser"
          help="Power it lets through crossed over parallel, such as 1e-5. Empty where it is not stated."
          {...field('polariserExtinction')}
        />
        <PlateOrder
          plates={plates}
          benchId={bench?.id ?? null}
          control={control}
          register={register}
          fault={formState.errors.plates?.message ?? formState.errors.plates?.root?.message}
        />
        <div role="status" className="space-y-2">
          {warnings.map((warning) => (
            <p key={warning}>
              <GapText text={warning} />
            </p>
          ))}
        </div>
      </div>
      <div className="space-y-4">
        <SelectField label="laser class (IEC 60825-1)" options={classOptions} {...field('laserClass')} />
        <TextField
          label="wavelengths that can reach an eye, nm"
          help="All of them, the pump included: 405, 810."
          {...field('hazardWavelengthsNm')}
          required
        />
        <LaserCaution
          laserClass={readLaserClass(values.laserClass ?? '')}
          hazardWavelengthsNm={hazards}
          variant="full"
        />
      </div>
      <div className="space-y-4 lg:col-span-2">
        {theirs === null ? (
          <FormProblem error={saving.error} />
        ) : (
          <EditConflict
            name={theirs.name}
            differences={benchDifferences(theirs, getValues(), plates)}
            onKeepYours={() => void handleSubmit(submit(theirs.revision))()}
            onTakeTheirs={() => {
              reset(valuesOfBench(theirs));
              setBaseRevision(theirs.revision);
              saving.reset();
              void queryClient.invalidateQueries({ queryKey: ['labs', lab.id] });
            }}
          />
        )}
        {theirs === null && (
          <div className="flex flex-wrap gap-3">
            <Button kind="filled" type="submit" waitsFor={saving.isPending ? 'the server' : undefined}>
              {bench === null ? 'Add the bench' : 'Save the bench'}
            </Button>
            <ButtonLink to={`/labs/${lab.id}/bench`}>Leave it as it was</ButtonLink>
          </div>
        )}
      </div>
    </form>
  );
}
