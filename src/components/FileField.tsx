import { classNames } from './class-names';
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

interface FileFieldProps extends Pick<FieldFrameProps, 'help' | 'fault' | 'className'> {
  readonly label: string;
  /** As the browser's own list filters: ".csv,text/plain". What a file is, its content decides. */
  readonly accept: string;
  /** The name of the file that was taken, as long as another may be. */
  readonly chosen?: string | null;
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
  chosen = null,
  onFile,
  sending,
  onCancel,
}: FileFieldProps) {
  const verb = chosen === null ? 'Choose a file' : 'Choose another';
  const sends = sending !== null && sending !== undefined;
  return (
    <div className={className}>
      <Field {...{ label, help, fault }}>
        {(control) => (
          // The browser's own words would say that no file is chosen: it is let go once it is read.
          <span
            className={classNames(
              controlBox,
              'relative flex items-center pl-0 has-[:focus-visible]:outline-3 has-[:focus-visible]:outline-offset-2 has-[:focus-visible]:outline-beam',
              'has-[[aria-invalid=true]]:border-fault has-[:disabled]:border-dashed has-[:disabled]:text-ink-3',
            )}
          >
            <span
              aria-hidden="true"
              className="font-title border-rule mr-3 flex h-full items-center border-r px-3"
            >
              {verb}
            </span>
            <span
              aria-hidden="true"
              className={classNames('min-w-0 truncate', chosen === null && 'text-ink-2')}
            >
              {chosen ?? 'none chosen'}
            </span>
            <input
              {...control}
              type="file"
              aria-label={chosen === null ? `${label}: ${verb}` : `${label}, ${chosen}: ${verb}`}
              accept={accept}
              disabled={sends}
              onChange={({ currentTarget }) => {
                const file = currentTarget.files?.[0];
                // The same file can be chosen again after a refusal.
                currentTarget.value = '';
                if (file !== undefined) onFile(file);
              }}
              className="absolute inset-0 cursor-pointer opacity-0 disabled:cursor-default"
            />
          </span>
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
