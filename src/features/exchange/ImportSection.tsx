import { useMutation, useQueryClient } from '@tanstack/react-query';
import { type ReactNode, useEffect, useRef, useState } from 'react';
import type { ImportResult } from '../../../shared/cabinet-document';
import { BeamWorking } from '../../components/BeamState';
import { Button } from '../../components/Button';
import { ErrorNote } from '../../components/ErrorNote';
import { sayDone } from '../../components/live-region-store';
import { SectionHead } from '../../components/SectionHead';
import { TextButton, TextLink } from '../../components/TextLink';
import { ApiError } from '../../lib/api';
import { problemSentences } from '../../lib/forms';
import { ChooseFile } from './ChooseFile';
import { FaultTable } from './FaultTable';
import type { CabinetFile } from './file-text';
import { planSentences } from './plan-words';
import { PlanView } from './PlanView';
import { sendImport } from './queries';

/** A file that comes in: chosen, looked at without changing anything, then imported as it was shown or left. */
export function ImportSection({ labId }: { readonly labId: string }) {
  const queryClient = useQueryClient();
  const [file, setFile] = useState<CabinetFile | null>(null);
  const looking = useMutation({ mutationFn: (chosen: CabinetFile) => sendImport(labId, bare(chosen), null) });
  const importing = useMutation({
    mutationFn: ({ chosen, planHash }: { readonly chosen: CabinetFile; readonly planHash: string }) =>
      sendImport(labId, bare(chosen), planHash),
    onSuccess: async ({ plan }) => {
      sayDone(`Imported. ${planSentences(plan).join(' ')}`);
      await queryClient.invalidateQueries({ queryKey: ['labs', labId] });
    },
  });
  const look = (chosen: CabinetFile) => {
    importing.reset();
    setFile(chosen);
    looking.mutate(chosen);
  };
  const leave = () => {
    setFile(null);
    looking.reset();
    importing.reset();
  };
  if (file === null) return <ChooseFile onFile={look} />;
  const name = file.name ?? 'The pasted text';
  const wrong = importing.error ?? looking.error;
  if (looking.isPending)
    return <BeamWorking doing={`Looking at what ${name} would change`} className="max-w-md" />;
  if (importing.isPending) return <BeamWorking doing={`Importing ${name}`} className="max-w-md" />;
  if (importing.data !== undefined) {
    return <Imported labId={labId} result={importing.data} name={name} onAnother={leave} />;
  }
  if (wrong !== null) {
    return <Refused name={name} error={wrong} onAgain={() => look(file)} onAnother={leave} />;
  }
  const { data } = looking;
  if (data === undefined) return null;
  return (
    <Focused title={`${name}: what would change`} note="a dry run; nothing is changed yet">
      <PlanView
        plan={data.plan}
        onImport={() => importing.mutate({ chosen: file, planHash: data.planHash })}
        onLeave={leave}
      />
    </Focused>
  );
}

const bare = ({ fileText, format }: CabinetFile) => ({ fileText, format });

/** A part that takes the place of another: its head is where the keyboard goes on. */
function Focused(props: { readonly title: string; readonly note?: string; readonly children: ReactNode }) {
  const section = useRef<HTMLElement>(null);
  useEffect(() => section.current?.focus(), []);
  return (
    <section ref={section} tabIndex={-1} aria-label={props.title} className="outline-offset-8">
      <SectionHead level={3} {...(props.note === undefined ? {} : { note: props.note })}>
        {props.title}
      </SectionHead>
      {props.children}
    </section>
  );
}

function Imported(props: {
  readonly labId: string;
  readonly result: ImportResult;
  readonly name: string;
  readonly onAnother: () => void;
}) {
  const { labId, result, name, onAnother } = props;
  return (
    <Focused title={`${name} is imported`}>
      <p className="mt-2 max-w-[80ch]">{planSentences(result.plan).join(' ')}</p>
      <p className="mt-3 flex flex-wrap gap-x-5 gap-y-2">
        <TextLink to={`/labs/${labId}/cabinet`}>See the cabinet</TextLink>
        <TextButton onClick={onAnother}>Import another file</TextButton>
      </p>
    </Focused>
  );
}

function Refused(props: {
  readonly name: string;
  readonly error: Error;
  readonly onAgain: () => void;
  readonly onAnother: () => void;
}) {
  const { name, error, onAgain, onAnother } = props;
  const problem = error instanceof ApiError ? error.problem : null;
  const faults = problem?.type === 'urn:quarterturn:problem:unreadable-file' ? (problem.fields ?? []) : [];
  const isFile = faults.length > 0;
  return (
    <Focused title={isFile ? `${name} can’t be read` : `${name} was not imported`}>
      {isFile ? (
        <>
          <p className="mt-2 mb-3 max-w-[80ch]">
            Nothing of it was imported. Mend the file where the table says, and choose it again.
          </p>
          <FaultTable faults={faults} />
        </>
      ) : (
        <ErrorNote title={problemSentences(error).join(' ')} className="mt-3 max-w-[80ch]" />
      )}
      <p className="mt-5 flex flex-wrap gap-4">
        {!isFile && <Button onClick={onAgain}>Look at what would change now</Button>}
        <Button onClick={onAnother}>Choose another file</Button>
      </p>
    </Focused>
  );
}
