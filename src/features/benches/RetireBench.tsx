import { useMutation, useQueryClient } from '@tanstack/react-query';
import { useState } from 'react';
import type { Bench } from '../../../shared/schemas/benches';
import { Button } from '../../components/Button';
import { Dialog } from '../../components/Dialog';
import { TextButton } from '../../components/TextLink';
import { FormProblem } from '../../lib/forms';
import { useLab } from '../labs';
import { retireBench, returnBench } from './queries';

/** Takes a bench out of use, or back in. Its protocols, versions and runs stay. */
export function RetireBench({ bench }: { readonly bench: Bench }) {
  const { lab } = useLab();
  const queryClient = useQueryClient();
  const [asks, setAsks] = useState(false);
  const retired = bench.retiredAt !== null;
  const changing = useMutation({
    mutationFn: () => (retired ? returnBench : retireBench)(lab.id, bench.id, bench.revision),
    onSuccess: async () => {
      setAsks(false);
      await queryClient.invalidateQueries({ queryKey: ['labs', lab.id] });
    },
  });
  const verb = retired ? 'Return' : 'Retire';
  const names = bench.order.map(({ name }) => name);
  const plates = [names.slice(0, -1).join(', '), ...names.slice(-1)]
    .filter((part) => part !== '')
    .join(' and ');
  const one = names.length === 1;
  return (
    <>
      <TextButton onClick={() => setAsks(true)}>
        {verb}
        <span className="sr-only"> {bench.name}</span>
      </TextButton>
      <Dialog
        open={asks}
        onClose={() => setAsks(false)}
        question={retired ? `Return ${bench.name} to use?` : `Retire ${bench.name}?`}
        actions={
          <>
            <Button
              kind={retired ? 'filled' : 'danger'}
              onClick={() => changing.mutate()}
              waitsFor={changing.isPending ? 'the server' : undefined}
            >
              {verb} {bench.name}
            </Button>
            <Button onClick={() => setAsks(false)}>Leave it as it was</Button>
          </>
        }
      >
        <p>
          {retired
            ? `${plates} ${one ? 'has' : 'have'} to be free for it. What was seated anew since needs a new calibration.`
            : `No run can start at it, and ${plates} ${one ? 'is' : 'are'} free for other benches. Protocols, versions and runs stay. It can be returned.`}
        </p>
        <FormProblem error={changing.error} />
      </Dialog>
    </>
  );
}
