import { type ComponentPropsWithRef } from 'react';
import { classNames } from './class-names';
import { Field, type FieldFrameProps } from './Field';

interface FarFieldProps
  extends
    FieldFrameProps,
    Omit<ComponentPropsWithRef<'input'>, 'className' | 'type' | 'inputMode' | 'required'> {}

/**
 * A number at the bench, as large as what is read from it: a line under it instead of a box. `inputMode` none keeps the tablet's own
 * keyboard down, since the page brings a keypad; keys of a real keyboard still write into it.
 */
export function FarField({ label, help, fault, required, className, id, ...input }: FarFieldProps) {
  return (
    <Field label={label} {...{ help, fault, required, id }} className={className}>
      {(control) => (
        <input
          autoComplete="off"
          spellCheck={false}
          {...input}
          {...control}
          type="text"
          inputMode="none"
          className={classNames(
            'block h-18 w-full rounded-none border-b-[3px] border-rule bg-transparent font-mono text-[3.25rem] leading-none font-title text-ink',
            'tracking-[-0.03em] caret-act focus:border-act focus:text-act focus-visible:outline-offset-4',
          )}
        />
      )}
    </Field>
  );
}
