import { useMutation, useQuery, useQueryClient } from '@tanstack/react-query';
import { useForm, useWatch } from 'react-hook-form';
import { useNavigate } from 'react-router-dom';
import { v7 as newId } from 'uuid';
import {
  createProtocolSchema,
  type DraftContent,
  type ProtocolKind,
} from '../../../shared/schemas/protocols';
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
  kind: ProtocolKind;
  start: 'empty' | 'filled';
}

const firstRows: Readonly<Record<ProtocolKind, readonly (readonly [label: string, expression: string])[]>> = {
  prepare: ['H', 'V', 'D', 'A', 'R', 'L'].map((letter) => [letter, `|${letter}>`]),
  apply: [
    ['X', 'X'],
    ['Y', 'Y'],
    ['Z', 'Z'],
    ['had', 'hadamard'],
    ['S', 'S'],
    ['T', 'T'],
  ],
};

function read({ name, purpose, kind, benchId, tolerance, start }: Typed): DraftContent {
  const rows = start === 'filled' ? firstRows[kind] : [];
  return {
    name,
    purpose,
    kind,
    benchId,
    objective: 'least-expected-infidelity',
    presentDialsDeg: null,
    toleranceInfidelity: readTypedNumber(tolerance),
    targets: rows.map(([label, expression]) => ({
      id: newId(),
      label,
      expression,
      heldFastAxesDeg: null,
    })),
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
    defaultValues: {
      name: '',
      purpose: '',
      kind: 'prepare',
      benchId: '',
      tolerance: '1e−3',
      start: 'empty',
    },
    resolver: schemaResolver(createProtocolSchema, read, {
      fieldOf: (path) => (path === 'toleranceInfidelity' ? 'tolerance' : null),
    }),
  });
  const create = useMutation({
    mutationFn: (content: DraftContent) => createProtocol(lab.id, content, keyFor(content)),
    onSuccess: async (protocol) => {
      await queryClient.invalidateQueries({ queryKey: ['labs', lab.id] });
      await navigate(`/labs/${lab.id}/plan/${protocol.id}`);
    },
  });
  const [kind, start] = useWatch({ control: form.control, name: ['kind', 'start'] });
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
        <SegmentedChoice
          label="what it makes"
          value={kind}
          onChange={(chosen) => form.setValue('kind', chosen)}
          segments={[
            { value: 'prepare', label: 'states, from the bench’s input' },
            { value: 'apply', label: 'unitaries, of any light' },
          ]}
        />
        <SelectField
          label="bench"
          placeholder="choose a bench"
          options={live.map(({ id, name, wavelengthNm, plates }) => ({
            value: id,
            label: `${name}, ${wavelengthNm} nm, ${plates.map((plate) => plate.name).join(' ')}`,
          }))}
          fault={errors.benchId === undefined ? undefined : 'Choose the bench that makes them.'}
          {...form.register('benchId')}
        />
        <NumberField
          label="tolerance, 1 − F"
          help="The largest 1 − F that is within, like 1e−3."
          className="max-w-48"
          fault={errors.tolerance?.message}
          {...form.register('tolerance')}
        />
        <SegmentedChoice
          label="rows to begin with"
          value={start}
          onChange={(chosen) => form.setValue('start', chosen)}
          segments={[
            { value: 'empty', label: 'none' },
            { value: 'filled', label: kind === 'prepare' ? 'the six Pauli states' : 'six usual gates' },
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
