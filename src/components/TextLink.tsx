import type { ComponentPropsWithRef } from 'react';
import { Link, type LinkProps } from 'react-router-dom';
import { classNames } from './class-names';

/** A way on: ink with the beam under it. Never place it on `lit`, where the amber line would be lost. */
export function TextLink({
  className,
  ...rest
}: Omit<LinkProps, 'className'> & { readonly className?: string }) {
  return <Link {...rest} className={classNames('beam-link', className)} />;
}

/** The same, for what happens on this page. At least 24 px high, as everything that takes a finger. */
export function TextButton({
  className,
  type = 'button',
  ...rest
}: Omit<ComponentPropsWithRef<'button'>, 'className'> & { readonly className?: string }) {
  return (
    <button
      {...rest}
      type={type}
      className={classNames('beam-link inline-block min-h-6 text-start font-words', className)}
    />
  );
}
