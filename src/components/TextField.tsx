import type { ComponentPropsWithRef } from 'react';
import { classNames } from './class-names';
import { controlBox, Field, type FieldFrameProps } from './Field';

interface TextFieldProps
  extends FieldFrameProps, Omit<ComponentPropsWithRef<'input'>, 'className' | 'type' | 'required'> {
  readonly type?: 'text' | 'email' | 'url' | 'search' | 'date' | 'datetime-local';
  /** Mono, for what is compared or typed as code: expressions, serial numbers. */
  readonly mono?: boolean;
}

export function TextField({
  label,
  help,
  fault,
  required,
  className,
  id,
  mono = false,
  type = 'text',
  ...input
}: TextFieldProps) {
  return (
    <Field {...{ label, help, fault, required, className, id }}>
      {(control) => (
        <input {...input} {...control} type={type} className={classNames(controlBox, mono && 'font-mono')} />
      )}
    </Field>
  );
}
