import { BeamLine } from './BeamLine';
import { controlBox, Field, type FieldFrameProps } from './Field';
import { Quantity } from './NumberText';
import { TextButton } from './TextLink';

/** A file on its way. */
interface Sending {
  readonly name: string;
  /** From 0 to 1. */
  readonly share: number;
}

interface FileFieldProps extends Pick<FieldFrameProps, 'label' | 'help' | 'fault' | 'className'> {
  /** As the browser's own list filters: ".csv,text/plain". What a file is, its content decides. */
  readonly accept: string;
  readonly onFile: (file: File) => void;
  readonly sending?: Sending | null;
  readonly onCancel?: () => void;
}

/** Chooses one file; while it is sent, the beam says how far it is and Cancel stops it. */
export function FileField({
  label,
  help,
  fault,
  className,
  accept,
  onFile,
  sending,
  onCancel,
}: FileFieldProps) {
  const sends = sending !== null && sending !== undefined;
  return (
    <div className={className}>
      <Field {...{ label, help, fault }}>
        {(control) => (
          <input
            {...control}
            type="file"
            accept={accept}
            disabled={sends}
            onChange={({ currentTarget }) => {
              const file = currentTarget.files?.[0];
              // The same file can be chosen again after a refusal.
              currentTarget.value = '';
              if (file !== undefined) onFile(file);
            }}
            className={`${controlBox} cursor-pointer pl-0 file:mr-3 file:h-full file:cursor-pointer file:border-0 file:border-r file:border-rule file:bg-transparent file:px-3 file:font-title file:text-ink`}
          />
        )}
      </Field>
      {sends && (
        <div className="mt-2">
          <div
            role="progressbar"
            aria-label={`Sending ${sending.name}`}
            aria-valuemin={0}
            aria-valuemax={100}
            aria-valuenow={Math.round(sending.share * 100)}
          >
            <BeamLine state={{ kind: 'working', share: sending.share }} />
          </div>
          <p className="flex flex-wrap gap-x-4 text-s">
            <span className="min-w-0 break-words">
              Sending {sending.name}, <Quantity text={String(Math.round(sending.share * 100))} unit="%" />
            </span>
            {onCancel !== undefined && <TextButton onClick={onCancel}>Cancel</TextButton>}
          </p>
        </div>
      )}
    </div>
  );
}
