import { useMutation, useQueryClient } from '@tanstack/react-query';
import type { CabinetPlate } from '../../../../shared/schemas/cabinet';
import type { AttachedFile } from '../../../../shared/schemas/files';
import { FileField } from '../../../components/FileField';
import { sayDone } from '../../../components/live-region-store';
import { TextButton } from '../../../components/TextLink';
import { formatDate } from '../../../lib/format';
import { FormProblem } from '../../../lib/forms';
import { fileAddress, maxFileWords } from '../../../lib/upload';
import { takeFileOff } from './queries';
import { sizeWords } from './size-words';
import { usePlateUpload } from './use-plate-upload';

const accepted = 'image/png,image/jpeg,image/webp,application/pdf,text/plain,.csv,.txt';

/** Photos and data sheets of a plate: shown, downloaded, taken off, and added by whoever keeps the cabinet. */
export function PlateFiles(props: {
  readonly labId: string;
  readonly plate: CabinetPlate;
  readonly files: readonly AttachedFile[];
  readonly edits: boolean;
}) {
  const { labId, plate, files, edits } = props;
  const headId = `files-${plate.id}`;
  return (
    <section aria-labelledby={headId} className="mt-6">
      <h3 id={headId} className="text-section">
        Photos and data sheets
      </h3>
      {files.length === 0 && <p className="text-ink-2 mt-1">None yet.</p>}
      <ul>
        {files.map((file) => (
          <FileRow key={file.id} {...{ labId, plate, file, edits }} />
        ))}
      </ul>
      {edits && <AddFile labId={labId} plate={plate} />}
    </section>
  );
}

function FileRow(props: {
  readonly labId: string;
  readonly plate: CabinetPlate;
  readonly file: AttachedFile;
  readonly edits: boolean;
}) {
  const { labId, plate, file, edits } = props;
  const queryClient = useQueryClient();
  const takingOff = useMutation({
    mutationFn: () => takeFileOff(labId, plate.id, file.id),
    onSuccess: async () => {
      await queryClient.invalidateQueries({ queryKey: ['labs', labId, 'plates'] });
      sayDone(`${file.name} is taken off.`);
    },
  });
  const address = fileAddress(labId, file.id);
  return (
    <li className="border-hair flex gap-3 border-b py-2.5">
      {file.mediaType.startsWith('image/') && (
        <img
          src={address}
          alt={`${file.kind === 'photo' ? 'Photo' : 'Data sheet'} of ${plate.name}: ${file.name}`}
          loading="lazy"
          className="border-rule bg-glass size-16 shrink-0 border object-contain"
        />
      )}
      <div className="min-w-0">
        <a href={address} download className="beam-link break-words">
          {file.name}
        </a>
        <p className="text-s text-ink-2 mt-1">
          {file.kind === 'photo' ? 'photo' : 'data sheet'}, {sizeWords(file.sizeBytes)}, {file.uploadedBy},{' '}
          {formatDate(new Date(file.uploadedAt))}
        </p>
        {edits && (
          <TextButton
            className="text-s mt-1"
            onClick={() => takingOff.mutate()}
            disabled={takingOff.isPending}
          >
            Take off<span className="sr-only"> {file.name}</span>
          </TextButton>
        )}
        <FormProblem error={takingOff.error} />
      </div>
    </li>
  );
}

function AddFile({ labId, plate }: { readonly labId: string; readonly plate: CabinetPlate }) {
  const { sending, fault, send, cancel } = usePlateUpload(labId, plate.id);
  return (
    <FileField
      className="mt-3"
      label="add a photo or a data sheet"
      help={`PNG, JPEG, WebP, PDF or plain text, at most ${maxFileWords}.`}
      fault={fault}
      accept={accepted}
      onFile={send}
      sending={sending}
      onCancel={cancel}
    />
  );
}
