import { type ReactNode, useId } from 'react';
import { classNames } from './class-names';

/** What a control needs to be tied to its label, help and fault. Spread it on the input. */
interface FieldControl {
  readonly id: string;
  readonly 'aria-describedby': string | undefined;
  readonly 'aria-invalid': true | undefined;
  readonly 'aria-required': true | undefined;
}

export interface FieldFrameProps {
  /** The quantity in words with its unit: "retardance, degrees". */
  readonly label: ReactNode;
  readonly help?: ReactNode;
  /** What is wrong, where, and what to do. */
  readonly fault?: ReactNode;
  readonly required?: boolean | undefined;
  readonly className?: string | undefined;
}

interface FieldProps extends FieldFrameProps {
  readonly id?: string | undefined;
  readonly children: (control: FieldControl) => ReactNode;
}

/** Label above, help or fault below, tied by `aria-describedby`. The fault takes the help's place and is announced. */
export function Field({ label, help, fault, required, className, id, children }: FieldProps) {
  const own = useId();
  const controlId = id ?? own;
  const noteId = `${controlId}-note`;
  const faulty = fault !== undefined && fault !== null && fault !== false && fault !== '';
  const helped = help !== undefined && help !== null && help !== '';
  return (
    <div className={className}>
      <label htmlFor={controlId} className="block text-s text-ink-2">
        {label}
      </label>
      {children({
        id: controlId,
        'aria-describedby': faulty || helped ? noteId : undefined,
        'aria-invalid': faulty || undefined,
        'aria-required': required === true ? true : undefined,
      })}
      {/* Always in the page, so that a fault that appears is announced. */}
      <p
        id={noteId}
        aria-live={faulty ? 'assertive' : undefined}
        className={classNames(
          'mt-1 text-s',
          faulty ? 'font-strong text-fault' : 'text-ink-2',
          !faulty && !helped && 'hidden',
        )}
      >
        {faulty ? fault : help}
      </p>
    </div>
  );
}

/** The box of every one-line control: 40 px, a `rule` edge, ink when it has the focus, `fault` when it can't be read. */
export const controlBox =
  'mt-1 block h-10 w-full rounded-none border bg-glass px-3 text-ink placeholder:text-ink-3 ' +
  'border-rule focus-visible:border-ink aria-invalid:border-fault disabled:border-dashed disabled:text-ink-3 ' +
  'read-only:bg-transparent max-sm:h-11';
