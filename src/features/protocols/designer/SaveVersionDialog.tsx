import { useMutation, useQueryClient } from '@tanstack/react-query';
import { useState } from 'react';
import { useNavigate } from 'react-router-dom';
import type { OpenQuestionRisk } from '../../../../shared/protocol/open-question-risk';
import type { ShownSolution } from '../../../../shared/schemas/protocols';
import { Button } from '../../../components/Button';
import { Dialog } from '../../../components/Dialog';
import { ErrorNote } from '../../../components/ErrorNote';
import { TextField } from '../../../components/TextField';
import { ApiError } from '../../../lib/api';
import { useIdempotencyKey } from '../../../lib/forms';
import { OpenQuestionRisks } from '../../versions';
import { saveVersion } from '../queries';

interface SaveVersionDialogProps {
  readonly labId: string;
  readonly protocolId: string;
  readonly number: number;
  readonly revision: number;
  /** The draft's last keys are still on their way to the server. */
  readonly draftIsSaved: boolean;
  readonly shown: readonly ShownSolution[];
  /** What of it hangs on a question that nobody has settled. */
  readonly risks: readonly OpenQuestionRisk[];
  readonly onClose: () => void;
}

/** Freezes the draft. The server solves every row again and refuses what differs from what this page shows. */
export function SaveVersionDialog(props: SaveVersionDialogProps) {
  const { labId, protocolId, number, revision, draftIsSaved, shown, risks, onClose } = props;
  const [message, setMessage] = useState('');
  const navigate = useNavigate();
  const queryClient = useQueryClient();
  const keyFor = useIdempotencyKey();
  const save = useMutation({
    mutationFn: () => {
      const body = { message: message.trim(), shown: [...shown] };
      return saveVersion(labId, protocolId, body, revision, keyFor([body, revision]));
    },
    onSuccess: async (version) => {
      await queryClient.invalidateQueries({ queryKey: ['labs', labId] });
      await navigate(`/labs/${labId}/plan/${protocolId}/versions/${version.number}`);
    },
  });
  const fields = save.error instanceof ApiError ? (save.error.problem?.fields ?? []) : [];
  const messageFault = fields.find(({ path }) => path === 'message')?.message;

  return (
    <Dialog
      open
      question={`Save version ${number}?`}
      onClose={onClose}
      actions={
        <>
          <Button
            kind="filled"
            waitsFor={
              message.trim() === ''
                ? 'a message'
                : !draftIsSaved
                  ? 'the draft to be saved'
                  : save.isPending
                    ? 'the server, which solves every row again'
                    : undefined
            }
            onClick={() => save.mutate()}
          >
            Save version {number}
          </Button>
          <Button onClick={onClose}>Go on with the draft</Button>
        </>
      }
    >
      <p>
        A version never changes. It freezes {shown.length === 1 ? 'one target' : `${shown.length} targets`},
        the plates with their calibrations, the convention, the tolerance, and every solution with its dials,
        under a hash that covers the version before it.
      </p>
      {risks.length > 0 && (
        <ul className="mt-3 list-none space-y-2">
          <OpenQuestionRisks risks={risks} count={shown.length} />
        </ul>
      )}
      <form
        className="mt-4"
        onSubmit={(event) => {
          event.preventDefault();
          if (message.trim() !== '' && draftIsSaved && !save.isPending) save.mutate();
        }}
      >
        <TextField
          label="message: what changed, and why"
          value={message}
          maxLength={200}
          autoFocus
          fault={messageFault}
          onChange={(event) => setMessage(event.target.value)}
        />
      </form>
      {save.isError && messageFault === undefined && (
        <ErrorNote title={`Version ${number} was not saved`}>
          <p>{save.error.message}</p>
          <ul>
            {fields.map(({ path, message: text }) => (
              <li key={path + text}>{text}</li>
            ))}
          </ul>
        </ErrorNote>
      )}
    </Dialog>
  );
}
