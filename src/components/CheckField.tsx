import { type ComponentPropsWithRef, type ReactNode, useId } from 'react';
import { classNames } from './class-names';

interface CheckFieldProps extends Omit<ComponentPropsWithRef<'input'>, 'className' | 'type'> {
  /** What holds when the box is ticked. */
  readonly label: ReactNode;
  readonly help?: ReactNode;
  readonly className?: string | undefined;
}

/** A box to tick, its words beside it and help under them. */
export function CheckField({ label, help, className, ...input }: CheckFieldProps) {
  const id = useId();
  const helpId = `${id}-help`;
  return (
    <div className={classNames('flex gap-2.5', className)}>
      <input
        {...input}
        id={id}
        type="checkbox"
        aria-describedby={help === undefined ? undefined : helpId}
        className="mt-0.5 size-5 shrink-0 accent-ink"
      />
      <div>
        <label htmlFor={id} className="block min-h-6">
          {label}
        </label>
        {help !== undefined && (
          <p id={helpId} className="text-s text-ink-2">
            {help}
          </p>
        )}
      </div>
    </div>
  );
}
