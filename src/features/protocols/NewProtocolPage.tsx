import { useMutation, useQuery, useQueryClient } from '@tanstack/react-query';
import { useForm, useWatch } from 'react-hook-form';
import { useNavigate } from 'react-router-dom';
import { v7 as newId } from 'uuid';
import { createProtocolSchema, type DraftContent, type DraftTarget } from '../../../shared/schemas/protocols';
import { BeamEmpty, BeamWrong } from '../../components/BeamState';
import { Button } from '../../components/Button';
import { ErrorNote } from '../../components/ErrorNote';
import { NumberField } from '../../components/NumberField';
import { SegmentedChoice } from '../../components/SegmentedChoice';
import { SelectField } from '../../components/SelectField';
import { TextArea } from '../../components/TextArea';
import { TextField } from '../../components/TextField';
import { TextLink } from '../../components/TextLink';
import { readTypedNumber, schemaResolver, useIdempotencyKey } from '../../lib/forms';
import { useTitle } from '../../lib/use-title';
import { benchesQuery } from '../benches';
import { useLab } from '../labs';
import { createProtocol } from './queries';

interface Typed {
  name: string;
  purpose: string;
  benchId: string;
  tolerance: string;
  start: 'empty' | 'six-states';
}

function sixStates(): DraftTarget[] {
  return ['H', 'V', 'D', 'A', 'R', 'L'].map((label) => ({
    id: newId(),
    label,
    expression: `|${label}>`,
    heldFastAxesDeg: null,
  }));
}

function read({ name, purpose, benchId, tolerance, start }: Typed): DraftContent {
  return {
    name,
    purpose,
    benchId,
    toleranceInfidelity: readTypedNumber(tolerance),
    targets: start === 'six-states' ? sixStates() : [],
  };
}

/** The few things a protocol can't be solved without; all of them can be changed later. */
export function Component() {
  const { lab, may } = useLab();
  const benches = useQuery(benchesQuery(lab.id));
  const navigate = useNavigate();
  const queryClient = useQueryClient();
  const keyFor = useIdempotencyKey();
  useTitle('Write a protocol');

  const live = (benches.data?.items ?? []).filter(({ retiredAt }) => retiredAt === null);
  const form = useForm<Typed, unknown, DraftContent>({
    defaultValues: { name: '', purpose: '', benchId: '', tolerance: '1e−3', start: 'empty' },
    resolver: schemaResolver(createProtocolSchema, read),
  });
  const create = useMutation({
    mutationFn: (content: DraftContent) => createProtocol(lab.id, content, keyFor(content)),
    onSuccess: async (protocol) => {
      await queryClient.invalidateQueries({ queryKey: ['labs', lab.id] });
      await navigate(`/labs/${lab.id}/plan/${protocol.id}`);
    },
  });
  const start = useWatch({ control: form.control, name: 'start' });
  const { errors } = form.formState;

  if (!may('protocols.write')) {
    return (
      <BeamWrong title="Protocols are written by designers and leads">
        Ask the lab’s lead for that role.
      </BeamWrong>
    );
  }
  if (benches.isSuccess && live.length === 0) {
    return (
      <BeamEmpty title="A protocol needs a bench">
        The angles are worked out for the plates that stand on it.{' '}
        <TextLink to={`/labs/${lab.id}/bench/new`}>Set up a bench</TextLink>
      </BeamEmpty>
    );
  }
  return (
    <form
      className="max-w-xl pt-3"
      onSubmit={(event) => void form.handleSubmit((content) => create.mutate(content))(event)}
    >
      <h1 className="m-0 text-title">Write a protocol</h1>
      <div className="mt-5 grid gap-5">
        <TextField label="name" autoFocus fault={errors.name?.message} {...form.register('name')} />
        <TextArea
          label="purpose, for whoever runs it"
          rows={3}
          fault={errors.purpose?.message}
          {...form.register('purpose')}
        />
        <SelectField
          label="bench"
          placeholder="choose a bench"
          options={live.map(({ id, name, wavelengthNm }) => ({
            value: id,
            label: `${name}, ${wavelengthNm} nm`,
          }))}
          fault={errors.benchId === undefined ? undefined : 'Choose the bench that makes these states.'}
          {...form.register('benchId')}
        />
        <NumberField
          label="tolerance, 1 − F"
          help="The largest 1 − F that is within, like 1e−3."
          className="max-w-48"
          fault={
            form.formState.errors.tolerance?.message ??
            (Object.hasOwn(errors, 'toleranceInfidelity')
              ? 'A tolerance is a number from 1e−9 to 0.5.'
              : undefined)
          }
          {...form.register('tolerance')}
        />
        <SegmentedChoice
          label="targets to begin with"
          value={start}
          onChange={(chosen) => form.setValue('start', chosen)}
          segments={[
            { value: 'empty', label: 'none' },
            { value: 'six-states', label: 'the six Pauli states' },
          ]}
        />
      </div>
      {create.isError && <ErrorNote title="The protocol was not made">{create.error.message}</ErrorNote>}
      <div className="mt-6 flex gap-4">
        <Button kind="filled" type="submit" waitsFor={create.isPending ? 'the server' : undefined}>
          Write the targets
        </Button>
      </div>
    </form>
  );
}
