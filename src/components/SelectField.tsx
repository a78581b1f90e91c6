import type { ComponentPropsWithRef } from 'react';
import { controlBox, Field, type FieldFrameProps } from './Field';

interface SelectOption {
  readonly value: string;
  readonly label: string;
}

interface SelectFieldProps
  extends FieldFrameProps, Omit<ComponentPropsWithRef<'select'>, 'className' | 'children' | 'required'> {
  readonly options: readonly SelectOption[];
  /** What stands there before anything is chosen. */
  readonly placeholder?: string;
}

/** The browser's own list, in our box: it knows the keyboard, the phone and the screen reader better than a drawn one. */
export function SelectField({
  label,
  help,
  fault,
  required,
  className,
  id,
  options,
  placeholder,
  ...input
}: SelectFieldProps) {
  return (
    <Field {...{ label, help, fault, required, className, id }}>
      {(control) => (
        <select {...input} {...control} className={controlBox}>
          {placeholder !== undefined && <option value="">{placeholder}</option>}
          {options.map(({ value, label: text }) => (
            <option key={value} value={value}>
              {text}
            </option>
          ))}
        </select>
      )}
    </Field>
  );
}
