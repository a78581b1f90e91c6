import { useMutation, useQueryClient } from '@tanstack/react-query';
import { useState } from 'react';
import { useForm, useWatch } from 'react-hook-form';
import type { CabinetPlate } from '../../../../shared/schemas/cabinet';
import { type CabinetMount, type WriteMount, writeMountSchema } from '../../../../shared/schemas/mounts';
import { Button } from '../../../components/Button';
import { Dialog } from '../../../components/Dialog';
import { sayDone } from '../../../components/live-region-store';
import { SegmentedChoice } from '../../../components/SegmentedChoice';
import { TextField } from '../../../components/TextField';
import {
  FormProblem,
  halfTypedSentence,
  isoFromOptionalField,
  schemaResolver,
  serverFaultAt,
  showServerFaults,
  useIdempotencyKey,
} from '../../../lib/forms';
import { EmptyMountChoice } from '../mounts/EmptyMountChoice';
import { emptyMount, mountFieldOf, type MountValues, readMount } from '../mounts/mount-form-values';
import { MountFields } from '../mounts/MountFields';
import { createMount } from '../mounts/queries';
import { seatPlate, takePlateOut } from './queries';
import { useOpenRuns } from './use-open-runs';
import { moveWords, possibleMove, type SeatMove } from './seat-move';

const places = [
  { value: 'empty', label: 'an empty mount' },
  { value: 'new', label: 'a new mount' },
] as const;

/** Where a plate goes, as far as it was chosen. */
type Target =
  | { readonly kind: 'same' | 'none' }
  | { readonly kind: 'id'; readonly id: string }
  | { readonly kind: 'new'; readonly mount: WriteMount };

/** Asks before a plate leaves its mount or comes into one: its zero goes with its seat, and nothing brings it back. */
export function SeatDialog(props: {
  readonly labId: string;
  readonly plate: CabinetPlate;
  readonly wished: SeatMove;
  readonly onClose: () => void;
}) {
  const { labId, plate, wished, onClose } = props;
  const queryClient = useQueryClient();
  const keyFor = useIdempotencyKey();
  const [move, setMove] = useState(possibleMove(plate, wished));
  const [why, setWhy] = useState('');
  const [when, setWhen] = useState({ text: '', isHalf: false });
  const [place, setPlace] = useState<'empty' | 'new'>('empty');
  const [chosen, setChosen] = useState<CabinetMount | null>(null);
  // What is missing is said once somebody has pressed the verb.
  const [pressed, setPressed] = useState(false);
  const { register, control, formState, handleSubmit, setValue, setError } = useForm<
    MountValues,
    unknown,
    WriteMount
  >({
    defaultValues: emptyMount,
    resolver: schemaResolver(writeMountSchema, readMount, { fieldOf: mountFieldOf }),
    mode: 'onTouched',
  });
  const [drive, direction, newName] = useWatch({ control, name: ['drive', 'direction', 'name'] });
  const { seat } = plate;
  const runs = useOpenRuns(labId, plate);
  const into = move === 'other' ? (place === 'new' ? newName.trim() || null : (chosen?.name ?? null)) : null;
  const words = moveWords(plate, move, into);
  const moving = useMutation({
    mutationFn: async (target: Target) => {
      const at = isoFromOptionalField(when.text);
      if (target.kind === 'none') return takePlateOut(labId, plate, { why, at });
      const mountId =
        target.kind === 'new'
          ? (await createMount(labId, target.mount, keyFor(target.mount))).id
          : target.kind === 'id'
            ? target.id
            : (seat?.mountId ?? '');
      return seatPlate(labId, plate, { mountId, why, at });
    },
    onSuccess: () => {
      onClose();
      sayDone(words.done);
      void queryClient.invalidateQueries({ queryKey: ['labs', labId] });
    },
    onError: async (error) => {
      if (
        serverFaultAt(error, 'at') === null &&
        showServerFaults(error, setError, (path) => (path === 'name' ? path : null))
      )
        moving.reset();
      // Somebody else may have moved it: what stands here is to be what is.
      await queryClient.invalidateQueries({ queryKey: ['labs', labId] });
    },
  });
  const whenFault = when.isHalf ? halfTypedSentence : serverFaultAt(moving.error, 'at');
  const whyFault = seat !== null && why.trim() === '' ? `Write why ${plate.name} is taken out.` : null;
  const press = () => {
    setPressed(true);
    if (whyFault !== null || when.isHalf) return;
    if (move === 'out') moving.mutate({ kind: 'none' });
    else if (move === 'anew') moving.mutate({ kind: 'same' });
    else if (place === 'new') void handleSubmit((mount) => moving.mutate({ kind: 'new', mount }))();
    else if (chosen !== null) moving.mutate({ kind: 'id', id: chosen.id });
  };
  // Done: for the plate as it is now this would be another question.
  if (moving.isSuccess) return null;
  return (
    <Dialog
      open
      wide={move === 'other' && place === 'new'}
      onClose={onClose}
      question={words.question}
      actions={
        <>
          <Button
            kind={seat === null ? 'filled' : 'danger'}
            onClick={press}
            waitsFor={moving.isPending ? 'the server' : undefined}
          >
            {words.verb}
          </Button>
          <Button onClick={onClose}>Leave it as it is</Button>
        </>
      }
    >
      {seat !== null && (
        <SegmentedChoice
          label="then"
          segments={[
            { value: 'out', label: 'it stays out' },
            { value: 'anew', label: `back into ${seat.mount.name}` },
            { value: 'other', label: 'into another mount' },
          ]}
          value={move}
          onChange={setMove}
        />
      )}
      <ul className="space-y-2">
        {words.consequences.map((sentence) => (
          <li key={sentence}>{sentence}</li>
        ))}
        {seat !== null && runs !== null && <li className="font-strong">{runs}</li>}
      </ul>
      {seat !== null && (
        <TextField
          label={`why ${plate.name} is taken out`}
          help="Stays in its history: cleaned, knocked, its ring worked loose."
          value={why}
          maxLength={200}
          required
          onChange={(event) => setWhy(event.target.value)}
          fault={pressed && whyFault !== null ? whyFault : undefined}
        />
      )}
      {move === 'other' && (
        <>
          <SegmentedChoice label="it goes into" segments={places} value={place} onChange={setPlace} />
          {place === 'empty' ? (
            <EmptyMountChoice
              labId={labId}
              chosenId={chosen?.id ?? ''}
              onChoose={setChosen}
              fault={pressed && chosen === null ? 'Choose one of the empty mounts.' : undefined}
            />
          ) : (
            <MountFields
              field={(name) => ({ ...register(name), fault: formState.errors[name]?.message })}
              drive={drive}
              onDrive={(value) => setValue('drive', value, { shouldDirty: true })}
              direction={direction}
              onDirection={(value) => setValue('direction', value, { shouldDirty: true })}
            />
          )}
        </>
      )}
      <TextField
        label="when (your time)"
        type="datetime-local"
        help="Empty where it is done just now."
        className="max-w-64"
        value={when.text}
        onBlur={({ target }) => setWhen({ text: target.value, isHalf: target.validity.badInput })}
        onChange={({ target }) => {
          setWhen({ text: target.value, isHalf: false });
          if (whenFault !== null) moving.reset();
        }}
        fault={whenFault ?? undefined}
      />
      {whenFault === null && <FormProblem error={moving.error} />}
    </Dialog>
  );
}
