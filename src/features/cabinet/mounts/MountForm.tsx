import { useMutation, useQueryClient } from '@tanstack/react-query';
import { useRef, useState } from 'react';
import { useForm, useWatch } from 'react-hook-form';
import { type CabinetMount, type WriteMount, writeMountSchema } from '../../../../shared/schemas/mounts';
import { Button } from '../../../components/Button';
import { sayDone } from '../../../components/live-region-store';
import {
  conflictingState,
  EditConflict,
  FormProblem,
  LeaveAsItWas,
  LeaveForm,
  schemaResolver,
  showServerFaults,
  useIdempotencyKey,
} from '../../../lib/forms';
import { mountConflict, mountDifferences } from './mount-conflict';
import { emptyMount, mountFieldOf, type MountValues, readMount, valuesOfMount } from './mount-form-values';
import { MountFields } from './MountFields';
import { createMount, updateMount } from './queries';

/** A mount that comes into the cabinet, or one that is edited. */
export function MountForm(props: {
  readonly labId: string;
  /** Null for a new one. */
  readonly mount: CabinetMount | null;
  readonly onDone: (mount: CabinetMount | null) => void;
}) {
  const { labId, mount, onDone } = props;
  const queryClient = useQueryClient();
  const isDoneRef = useRef(false);
  const keyFor = useIdempotencyKey();
  // What this form was filled from. A refetch behind it must not make an old form look new.
  const [baseRevision, setBaseRevision] = useState(mount?.revision ?? 0);
  const { register, control, formState, handleSubmit, setValue, setError, getValues, reset } = useForm<
    MountValues,
    unknown,
    WriteMount
  >({
    defaultValues: mount === null ? emptyMount : valuesOfMount(mount),
    resolver: schemaResolver(writeMountSchema, readMount, { fieldOf: mountFieldOf }),
    mode: 'onTouched',
  });
  const [drive, direction] = useWatch({ control, name: ['drive', 'direction'] });
  const saving = useMutation({
    mutationFn: ({ body, revision }: { body: WriteMount; revision: number }) =>
      mount === null ? createMount(labId, body, keyFor(body)) : updateMount(labId, mount.id, body, revision),
    onSuccess: async (saved) => {
      isDoneRef.current = true;
      sayDone(mount === null ? `${saved.name} is in the cabinet.` : `${saved.name} is saved.`);
      await queryClient.invalidateQueries({ queryKey: ['labs', labId] });
      onDone(saved);
    },
    onError: (error) => {
      // Said at the field, it need not be said under the form.
      if (showServerFaults(error, setError, (path) => (path === 'name' ? path : null))) saving.reset();
    },
  });
  const submit = (revision: number) => handleSubmit((body) => saving.mutate({ body, revision }));
  const theirs = mountConflict(conflictingState(saving.error));
  const turned = mount?.plate !== null && mount !== null && Number(direction) !== mount.direction;
  return (
    <form noValidate onSubmit={(event) => void submit(baseRevision)(event)} className="max-w-4xl space-y-4">
      <MountFields
        field={(name) => ({ ...register(name), fault: formState.errors[name]?.message })}
        drive={drive}
        onDrive={(chosen) => setValue('drive', chosen, { shouldDirty: true })}
        direction={direction}
        onDirection={(chosen) => setValue('direction', chosen, { shouldDirty: true })}
      />
      {turned && (
        <p role="status" className="font-strong text-fault">
          {mount.plate?.name} sits in it: every dial that was solved for it so far turns it the other way and
          is void. Drafts are solved anew by themselves; versions hold wrong dials until they are re-solved.
        </p>
      )}
      {theirs === null ? (
        <FormProblem error={saving.error} />
      ) : (
        <EditConflict
          name={theirs.name}
          differences={mountDifferences(theirs, getValues())}
          onKeepYours={() => void submit(theirs.revision)()}
          onTakeTheirs={() => {
            reset(valuesOfMount(theirs));
            setBaseRevision(theirs.revision);
            saving.reset();
            void queryClient.invalidateQueries({ queryKey: ['labs', labId] });
          }}
        />
      )}
      {theirs === null && (
        <div className="flex flex-wrap gap-3">
          <Button kind="filled" type="submit" waitsFor={saving.isPending ? 'the server' : undefined}>
            {mount === null
              ? 'Add the mount'
              : turned
                ? `Save ${mount.name}, its numbers the other way`
                : `Save ${mount.name}`}
          </Button>
          <LeaveAsItWas isDoneRef={isDoneRef} onLeave={() => onDone(null)} />
        </div>
      )}
      <LeaveForm isDirty={formState.isDirty} isDoneRef={isDoneRef} what="the mount" />
    </form>
  );
}
