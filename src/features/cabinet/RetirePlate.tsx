import { useMutation, useQueryClient } from '@tanstack/react-query';
import { useState } from 'react';
import type { Plate } from '../../../shared/schemas/cabinet';
import { Button } from '../../components/Button';
import { Dialog } from '../../components/Dialog';
import { TextButton } from '../../components/TextLink';
import { FormProblem } from '../../lib/forms';
import { useLab } from '../labs';
import { retirePlate, returnPlate } from './queries';

/** Takes a plate out of use, or back in. What was measured and saved with it stays. */
export function RetirePlate({ plate }: { readonly plate: Plate }) {
  const { lab } = useLab();
  const queryClient = useQueryClient();
  const [asks, setAsks] = useState(false);
  const retired = plate.retiredAt !== null;
  const changing = useMutation({
    mutationFn: () =>
      retired ? returnPlate(lab.id, plate.id, plate.revision) : retirePlate(lab.id, plate.id, plate.revision),
    onSuccess: async () => {
      setAsks(false);
      await queryClient.invalidateQueries({ queryKey: ['labs', lab.id] });
    },
  });
  const benches = plate.benches.map(({ name }) => name).join(' and ');
  return (
    <>
      <TextButton onClick={() => setAsks(true)}>
        {retired ? 'Return' : 'Retire'} {plate.name}
      </TextButton>
      <Dialog
        open={asks}
        onClose={() => setAsks(false)}
        question={retired ? `Return ${plate.name} to the cabinet?` : `Retire ${plate.name}?`}
        actions={
          <>
            <Button
              kind={retired ? 'filled' : 'danger'}
              onClick={() => changing.mutate()}
              waitsFor={
                changing.isPending
                  ? 'the server'
                  : !retired && benches !== ''
                    ? `another plate at ${benches}`
                    : undefined
              }
            >
              {retired ? 'Return' : 'Retire'} {plate.name}
            </Button>
            <Button onClick={() => setAsks(false)}>Leave it as it was</Button>
          </>
        }
      >
        {retired ? (
          <p>
            It can be put into a bench again. If it was out of its mount since, its zero is another one:
            record a calibration before its dials are believed.
          </p>
        ) : (
          <p>
            It leaves the tray and cannot be chosen for a bench.{' '}
            {benches === ''
              ? 'No bench has it in its beam now.'
              : `It stands in the beam of ${benches}: put another plate there first.`}{' '}
            Versions and runs that used it keep it. It can be returned.
          </p>
        )}
        <FormProblem error={changing.error} />
      </Dialog>
    </>
  );
}
