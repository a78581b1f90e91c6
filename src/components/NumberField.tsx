import type { ComponentPropsWithRef } from 'react';
import { controlBox, Field, type FieldFrameProps } from './Field';

interface NumberFieldProps
  extends
    FieldFrameProps,
    Omit<ComponentPropsWithRef<'input'>, 'className' | 'type' | 'inputMode' | 'required'> {}

/**
 * A number as it is typed. Never `type="number"`: its wheel and arrows change a value unseen, and it hides what was typed.
 * A typed hyphen in front of a digit shows as the true minus; `parseTypedNumber` reads both.
 */
export function NumberField({
  label,
  help,
  fault,
  required,
  className,
  id,
  onChange,
  ...input
}: NumberFieldProps) {
  return (
    <Field {...{ label, help, fault, required, className, id }}>
      {(control) => (
        <input
          autoComplete="off"
          spellCheck={false}
          {...input}
          {...control}
          type="text"
          inputMode="decimal"
          onChange={(event) => {
            const { currentTarget } = event;
            if (currentTarget.value.includes('-')) {
              const caret = currentTarget.selectionStart;
              currentTarget.value = currentTarget.value.replaceAll('-', '\u2212');
              currentTarget.setSelectionRange(caret, caret);
            }
            onChange?.(event);
          }}
          className={`${controlBox} font-mono text-[1.0625rem]`}
        />
      )}
    </Field>
  );
}
