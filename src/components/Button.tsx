import type { ComponentPropsWithRef, ReactNode } from 'react';
import { Link, type LinkProps } from 'react-router-dom';
import { classNames } from './class-names';

export type ButtonKind = 'filled' | 'outlined' | 'danger' | 'quiet';

const kinds: Record<ButtonKind, string> = {
  // One per page. No large fill in the dark room, so there it is a heavy edge.
  filled:
    'border-ink bg-ink text-paper hover:border-ink-2 hover:bg-ink-2 dark-room:border-2 dark-room:border-act dark-room:bg-transparent dark-room:text-act dark-room:hover:bg-wash',
  outlined: 'border-ink bg-transparent text-ink hover:bg-wash',
  danger: 'border-fault bg-transparent text-fault hover:bg-wash',
  quiet: 'border-transparent bg-transparent text-ink hover:border-rule hover:bg-wash',
};

const size = {
  desk: 'min-h-10 px-4 py-2 text-[0.9375rem] leading-5',
  phone: 'min-h-11 px-4 py-2 text-[0.9375rem] leading-5',
  // A sleeve or a glove at the bench: 84 px at least, and the caller keeps 16 px between two.
  far: 'min-h-21 px-6 py-3 text-[1.125rem] leading-6',
} as const;

const shape =
  'inline-flex items-center justify-center gap-2 rounded border text-center font-title no-underline select-none';

export interface ButtonProps extends Omit<ComponentPropsWithRef<'button'>, 'className'> {
  readonly kind?: ButtonKind;
  readonly size?: keyof typeof size;
  /**
   * What the button waits for. It is then dashed, does nothing, and says so to everyone: it keeps its place in the Tab order,
   * since a reason that can't be reached is no reason.
   */
  readonly waitsFor?: string | undefined;
  readonly wide?: boolean;
  readonly className?: string;
  readonly children: ReactNode;
}

/** A verb with its object. One `filled` button per page. */
export function Button({
  kind = 'outlined',
  size: chosen = 'desk',
  waitsFor,
  wide = false,
  className,
  type = 'button',
  onClick,
  title,
  children,
  ...rest
}: ButtonProps) {
  const waits = waitsFor !== undefined;
  return (
    <button
      {...rest}
      type={waits ? 'button' : type}
      aria-disabled={waits ? true : rest['aria-disabled']}
      title={waits ? waitsFor : title}
      onClick={waits ? undefined : onClick}
      className={classNames(
        shape,
        size[chosen],
        wide && 'w-full',
        waits ? 'cursor-default border-dashed border-rule bg-transparent text-ink-3' : kinds[kind],
        'disabled:cursor-default disabled:border-dashed disabled:border-rule disabled:bg-transparent disabled:text-ink-3',
        chosen === 'far' &&
          !waits &&
          (kind === 'filled'
            ? 'border-[3px]! text-[1.375rem] font-section'
            : 'border-2 border-rule text-ink-2'),
        className,
      )}
    >
      {children}
      {waits && <span className="sr-only">, waits: {waitsFor}</span>}
    </button>
  );
}

export interface ButtonLinkProps extends Omit<LinkProps, 'className'> {
  readonly kind?: ButtonKind;
  readonly size?: keyof typeof size;
  readonly className?: string;
}

/** A link that looks like a button: it goes somewhere, so it stays a link for the keyboard and for "open in a new tab". */
export function ButtonLink({
  kind = 'outlined',
  size: chosen = 'desk',
  className,
  ...rest
}: ButtonLinkProps) {
  return (
    <Link
      {...rest}
      className={classNames(shape, size[chosen], kinds[kind], chosen === 'far' && 'border-[3px]', className)}
    />
  );
}
