import { useMutation, useQueryClient } from '@tanstack/react-query';
import { useState } from 'react';
import { type Convention, sameConvention } from '../../../shared/optics';
import { Button } from '../../components/Button';
import { sayDone } from '../../components/live-region-store';
import { SectionHead } from '../../components/SectionHead';
import { SegmentedChoice } from '../../components/SegmentedChoice';
import { TextLink } from '../../components/TextLink';
import { FormProblem } from '../../lib/forms';
import { conventionsHref } from '../conventions';
import { ConventionExample } from './ConventionExample';
import { useLab } from './lab-context';
import { updateLab } from './queries';

const phases = [
  { value: 'kz-wt', label: 'kz − ωt' },
  { value: 'wt-kz', label: 'ωt − kz' },
] as const;
const handednesses = [
  { value: 'receiver', label: 'from the receiver' },
  { value: 'source', label: 'from the source' },
] as const;
const signs = [
  { value: 'R', label: '+ is R' },
  { value: 'L', label: '+ is L' },
] as const;

/** The three flags, with one state read under them, so that a wrong one is seen before it is saved. */
export function ConventionSection() {
  const { lab, may } = useLab();
  const queryClient = useQueryClient();
  const [chosen, setChosen] = useState<Convention>(lab.convention);
  const saving = useMutation({
    mutationFn: (convention: Convention) => updateLab(lab.id, { convention }),
    onSuccess: async () => {
      sayDone('The convention is saved; drafts and benches are written in it.');
      await queryClient.invalidateQueries({ queryKey: ['labs', lab.id] });
    },
  });
  const changes = may('lab.settings');
  const same = sameConvention(chosen, lab.convention);
  return (
    <section aria-labelledby="convention">
      <SectionHead id="convention" className="mb-3">
        Convention
      </SectionHead>
      <p className="text-ink-2 mb-4">
        How this lab writes and reads states. It changes what is shown, never what light the plates make;
        versions keep the convention they were written in.{' '}
        <TextLink to="/how-numbers-are-made">What is inside</TextLink>
      </p>
      <div className="flex flex-wrap gap-x-8 gap-y-4">
        <SegmentedChoice
          label="phase"
          segments={phases}
          value={chosen.phase}
          disabled={!changes}
          onChange={(phase) => setChosen({ ...chosen, phase })}
        />
        <SegmentedChoice
          label="hands named"
          segments={handednesses}
          value={chosen.handedness}
          disabled={!changes}
          onChange={(handedness) => setChosen({ ...chosen, handedness })}
        />
        <SegmentedChoice
          label="sign of S3"
          segments={signs}
          value={chosen.s3Sign}
          disabled={!changes}
          onChange={(s3Sign) => setChosen({ ...chosen, s3Sign })}
        />
      </div>
      <ConventionExample convention={chosen} />
      <p className="mt-2">
        <TextLink to={conventionsHref('state', '(H + i V)/sqrt(2)', chosen)}>
          The same light in each convention
        </TextLink>
      </p>
      {changes && !same && (
        <div className="mt-4 space-y-3">
          <p>
            Every row of a draft and every bench’s input state that can be read is rewritten, so that the
            light stays the same: an R may then be written as L. What cannot be read stays as it was typed.
            Versions keep their words and their convention.
          </p>
          <FormProblem error={saving.error} />
          <div className="flex flex-wrap gap-3">
            <Button
              kind="filled"
              onClick={() => saving.mutate(chosen)}
              waitsFor={saving.isPending ? 'the server' : undefined}
            >
              Save the convention
            </Button>
            <Button onClick={() => setChosen(lab.convention)}>Leave it as it was</Button>
          </div>
        </div>
      )}
    </section>
  );
}
