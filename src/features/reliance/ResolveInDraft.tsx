import { useMutation, useQueryClient } from '@tanstack/react-query';
import { useNavigate } from 'react-router-dom';
import type { ReliantVersion } from '../../../shared/schemas/reliance';
import { Button, ButtonLink } from '../../components/Button';
import { Dialog } from '../../components/Dialog';
import { ErrorNote } from '../../components/ErrorNote';
import { sayDone } from '../../components/live-region-store';
import { TextButton } from '../../components/TextLink';
import { ApiError } from '../../lib/api';
import { draftFromVersion } from './queries';

/** Makes the protocol's draft of a version and opens it: the designer solves it with the calibrations of now. */
export function ResolveInDraft(props: { readonly labId: string; readonly version: ReliantVersion }) {
  const { labId, version } = props;
  const { protocolId, protocolName, number, draftRevision } = version;
  const queryClient = useQueryClient();
  const navigate = useNavigate();
  const draftPage = `/labs/${labId}/plan/${protocolId}`;
  const making = useMutation({
    mutationFn: (replace: boolean) => draftFromVersion(labId, protocolId, { number, replace }, draftRevision),
    onSuccess: async () => {
      await queryClient.invalidateQueries({ queryKey: ['labs', labId, 'protocols'] });
      await navigate(draftPage);
      sayDone(
        `The draft holds the targets of version ${number} again, solved with the calibrations of now. Save it as a new version when it is as you want it.`,
      );
    },
    // After a refusal, too, the next try is to be made against the draft as it is.
    onSettled: () => queryClient.invalidateQueries({ queryKey: ['labs', labId, 'plates'] }),
  });
  const { error } = making;
  const movedOn = error instanceof ApiError && error.status === 409;
  return (
    <>
      <TextButton aria-disabled={making.isPending} onClick={() => !making.isPending && making.mutate(false)}>
        Re-solve in a draft
        <span className="sr-only">
          : {protocolName} {number}
        </span>
      </TextButton>
      {error !== null && !movedOn && (
        <ErrorNote title="The draft was not made" className="mt-2">
          {error.message}
        </ErrorNote>
      )}
      <Dialog
        open={movedOn}
        question={`Replace the draft of ${protocolName}?`}
        onClose={() => making.reset()}
        actions={
          <>
            <Button kind="danger" onClick={() => making.mutate(true)}>
              Replace the draft
            </Button>
            <ButtonLink to={draftPage}>Open the draft as it is</ButtonLink>
            <Button onClick={() => making.reset()}>Leave both</Button>
          </>
        }
      >
        <p>{movedOn ? error.message : ''}</p>
      </Dialog>
    </>
  );
}
