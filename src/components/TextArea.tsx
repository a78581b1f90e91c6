import type { ComponentPropsWithRef } from 'react';
import { classNames } from './class-names';
import { controlBox, Field, type FieldFrameProps } from './Field';

interface TextAreaProps
  extends FieldFrameProps, Omit<ComponentPropsWithRef<'textarea'>, 'className' | 'required'> {
  readonly mono?: boolean;
}

export function TextArea({
  label,
  help,
  fault,
  required,
  className,
  id,
  mono = false,
  rows = 3,
  ...input
}: TextAreaProps) {
  return (
    <Field {...{ label, help, fault, required, className, id }}>
      {(control) => (
        <textarea
          {...input}
          {...control}
          rows={rows}
          className={classNames(controlBox, 'h-auto py-2 max-sm:h-auto', mono && 'font-mono')}
        />
      )}
    </Field>
  );
}
