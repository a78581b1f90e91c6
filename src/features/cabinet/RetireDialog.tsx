import { useMutation, useQueryClient } from '@tanstack/react-query';
import { type ReactNode, useState } from 'react';
import { Button } from '../../components/Button';
import { Dialog } from '../../components/Dialog';
import { TextButton } from '../../components/TextLink';
import { FormProblem } from '../../lib/forms';

/** Takes a plate or a mount out of use, or back in, by a button that asks first. What was measured and saved with it stays. */
export function RetireDialog(props: {
  readonly labId: string;
  readonly name: string;
  readonly retired: boolean;
  /** What has to happen before it can be retired. */
  readonly waitsFor: string | undefined;
  readonly change: () => Promise<unknown>;
  /** What follows. */
  readonly children: ReactNode;
}) {
  const { labId, name, retired, waitsFor, change, children } = props;
  const queryClient = useQueryClient();
  const [asks, setAsks] = useState(false);
  const changing = useMutation({
    mutationFn: change,
    onSuccess: () => setAsks(false),
    // After a refusal, too, what stands here is to be what is.
    onSettled: () => queryClient.invalidateQueries({ queryKey: ['labs', labId] }),
  });
  const verb = retired ? 'Return' : 'Retire';
  return (
    <>
      <TextButton
        onClick={() => {
          changing.reset();
          setAsks(true);
        }}
      >
        {verb} {name}
      </TextButton>
      <Dialog
        open={asks}
        onClose={() => setAsks(false)}
        question={retired ? `Return ${name} to the cabinet?` : `Retire ${name}?`}
        actions={
          <>
            <Button
              kind={retired ? 'filled' : 'danger'}
              onClick={() => changing.mutate()}
              waitsFor={changing.isPending ? 'the server' : waitsFor}
            >
              {verb} {name}
            </Button>
            <Button onClick={() => setAsks(false)}>Leave it as it was</Button>
          </>
        }
      >
        {children}
        <FormProblem error={changing.error} />
      </Dialog>
    </>
  );
}
