import { useMutation, useQueryClient } from '@tanstack/react-query';
import { useRef, useState } from 'react';
import { type FieldErrors, useController, useForm, useWatch } from 'react-hook-form';
import { useNavigate } from 'react-router-dom';
import {
  type Bench,
  type BenchPart,
  type CreateBench,
  createBenchSchema,
} from '../../../shared/schemas/benches';
import type { CabinetPlate } from '../../../shared/schemas/cabinet';
import { Button } from '../../components/Button';
import { sayDone } from '../../components/live-region-store';
import { SelectField } from '../../components/SelectField';
import { TextField } from '../../components/TextField';
import {
  conflictingState,
  EditConflict,
  FormProblem,
  LeaveAsItWas,
  LeaveForm,
  readOptionalNumber,
  readTypedNumber,
  schemaResolver,
  showServerFaults,
} from '../../lib/forms';
import { useLab } from '../labs';
import { BeamEditor, type BeamFaults } from './BeamEditor';
import { benchConflict, benchDifferences } from './bench-conflict';
import { fieldOf } from './bench-fields';
import {
  type BenchFieldOf,
  type BenchValues,
  classOptions,
  emptyBench,
  eyewearWavelengths,
  hasBothDetectors,
  readBench,
  readLaserClass,
  valuesOfBench,
} from './bench-form-values';
import { DetectorFields } from './DetectorFields';
import { inputFault } from './InputReading';
import { LaserCaution } from './LaserCaution';
import { LightFields } from './LightFields';

/** A new bench, or one that is edited. `save` gets the request and the revision it was made against. */
export function BenchForm(props: {
  readonly bench: Bench | null;
  /** Those of its beam. Others come from the cabinet as they are looked for. */
  readonly plates: readonly CabinetPlate[];
  readonly save: (body: CreateBench, revision: number) => Promise<Bench>;
  readonly onSaved: (bench: Bench) => void;
}) {
  const { bench, plates, save, onSaved } = props;
  const { lab } = useLab();
  const queryClient = useQueryClient();
  const navigate = useNavigate();
  const isDoneRef = useRef(false);
  const [now] = useState(() => new Date());
  // What this form was filled from. A refetch behind it must not make an old form look new.
  const [base, setBase] = useState(bench);
  const [found, setFound] = useState<readonly CabinetPlate[]>([]);
  const { register, control, formState, handleSubmit, setError, getValues, reset } = useForm<
    BenchValues,
    unknown,
    CreateBench
  >({
    defaultValues: bench === null ? emptyBench : valuesOfBench(bench),
    resolver: schemaResolver(createBenchSchema, readBench, { fieldOf }),
    mode: 'onTouched',
  });
  const values = useWatch({ control, compute: (typed: BenchValues) => typed });
  const beam = useController({ control, name: 'beam' }).field;
  const saving = useMutation({
    mutationFn: ({ body, revision }: { body: CreateBench; revision: number }) => save(body, revision),
    onSuccess: async (saved) => {
      isDoneRef.current = true;
      sayDone(bench === null ? `${saved.name} is added.` : `${saved.name} is saved.`);
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
  const field: BenchFieldOf = (name) => ({ ...register(name), fault: formState.errors[name]?.message });
  const known = new Map([...plates, ...found].map((plate) => [plate.id, plate]));
  const nameOf = (plateId: string) =>
    known.get(plateId)?.name ?? base?.order.find((place) => place.plateId === plateId)?.name;
  const theirs = benchConflict(conflictingState(saving.error));
  return (
    <form
      noValidate
      onSubmit={(event) => void handleSubmit(submit(base?.revision ?? 0))(event)}
      className="grid grid-cols-1 gap-x-14 gap-y-8 desk:grid-cols-[minmax(0,1fr)_minmax(0,1.15fr)]"
    >
      <div className="space-y-8">
        <LightFields field={field} inputExpression={values.inputExpression} convention={lab.convention} />
        <div className="space-y-4">
          <SelectField label="laser class (IEC 60825-1)" options={classOptions} {...field('laserClass')} />
          <TextField
            label="wavelengths that can reach an eye, nm"
            help="All of them, the pump included: 405, 810."
            {...field('hazardWavelengthsNm')}
            required
          />
          <div role="status">
            <LaserCaution
              laserClass={readLaserClass(values.laserClass)}
              hazardWavelengthsNm={eyewearWavelengths(values.hazardWavelengthsNm)}
              variant="full"
            />
          </div>
        </div>
      </div>
      <div className="space-y-8">
        <section aria-labelledby="beam-head">
          <h2 id="beam-head" className="text-section mb-1">
            Plates in beam order
          </h2>
          <p id="bench-grip-help" className="text-s text-ink-2 mb-3">
            Drag a plate by its handle, or grab it with Space and move it with the arrow keys; Up and Down do
            the same.
          </p>
          <BeamEditor
            beam={values.beam}
            onBeam={beam.onChange}
            plates={known}
            nameOf={nameOf}
            onFound={(plate) => setFound([...found, plate])}
            bench={{
              id: base?.id ?? null,
              name: values.name,
              wavelengthNm: readTypedNumber(values.wavelengthNm),
              temperatureC: readOptionalNumber(values.temperatureC),
            }}
            faults={beamFaults(formState.errors)}
            now={now}
          />
        </section>
        <DetectorFields field={field} hasBoth={hasBothDetectors(values)} />
      </div>
      <div className="space-y-4 desk:col-span-2">
        {theirs === null ? (
          <FormProblem error={saving.error} />
        ) : (
          <EditConflict
            name={theirs.name}
            differences={benchDifferences(theirs, getValues(), nameOf)}
            onKeepYours={() => void handleSubmit(submit(theirs.revision))()}
            onTakeTheirs={() => {
              reset(valuesOfBench(theirs));
              setBase(theirs);
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
            <LeaveAsItWas isDoneRef={isDoneRef} onLeave={() => void navigate(`/labs/${lab.id}/bench`)} />
          </div>
        )}
      </div>
      <LeaveForm isDirty={formState.isDirty} isDoneRef={isDoneRef} what="the bench" />
    </form>
  );
}

function beamFaults({ beam }: FieldErrors<BenchValues>): BeamFaults {
  const of = (part: BenchPart) => {
    const error = beam?.[part];
    return {
      part: error?.message,
      places: Array.from({ length: error?.length ?? 0 }, (_, place) => error?.[place]?.message),
    };
  };
  return { preparation: of('preparation'), analysis: of('analysis') };
}
