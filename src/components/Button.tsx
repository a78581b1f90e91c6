import type { ComponentPropsWithRef, ReactNode } from 'react';
import { Link, type LinkProps } from 'react-router-dom';
import { classNames } from './class-names';

type ButtonKind = 'filled' | 'outlined' | 'danger' | 'quiet';

/** Colours of the edge, the face and the words. */
const kinds: Record<ButtonKind, string> = {
  // One per page. No large fill in the dark room, so there it is a heavy edge.
  filled:
    'border-ink bg-ink text-paper hover:border-ink-2 hover:bg-ink-2 dark-room:border-act dark-room:bg-transparent dark-room:text-act dark-room:hover:bg-wash',
  outlined: 'border-ink bg-transparent text-ink hover:bg-wash',
  danger: 'border-fault bg-transparent text-fault hover:bg-wash',
  quiet: 'border-transparent bg-transparent text-ink hover:border-rule hover:bg-wash',
};
const waiting = 'cursor-default border-dashed border-rule bg-transparent text-ink-3';
/** From two metres away only the one filled button is bright. */
const quietFar = 'border-rule bg-transparent text-ink-2 hover:bg-wash';

type ButtonSize = 'desk' | 'phone' | 'far';

/** Room, edge and letters; every property once, since no two utilities for one property have an order to count on. */
function sized(size: ButtonSize, kind: ButtonKind): string {
  // A sleeve or a glove at the bench: 84 px is the least, and the caller keeps 16 px between two.
  if (size === 'far') {
    return kind === 'filled'
      ? 'min-h-22.5 border-3 px-6 py-3 text-[1.4375rem] leading-7 font-[680]'
      : 'min-h-22.5 border-2 px-6 py-3 text-[1.125rem] leading-6 font-title';
  }
  const edge = kind === 'filled' ? 'border dark-room:border-2' : 'border';
  return `${size === 'desk' ? 'min-h-10' : 'min-h-11'} ${edge} px-4 py-2 text-[0.9375rem] leading-5 font-title`;
}

function coloured(size: ButtonSize, kind: ButtonKind): string {
  return size === 'far' && (kind === 'outlined' || kind === 'quiet') ? quietFar : kinds[kind];
}

const shape = 'inline-flex items-center justify-center gap-2 rounded text-center no-underline select-none';

interface ButtonProps extends Omit<ComponentPropsWithRef<'button'>, 'className'> {
  readonly kind?: ButtonKind;
  readonly size?: ButtonSize;
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
  size = 'desk',
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
        sized(size, kind),
        wide && 'w-full',
        waits ? waiting : coloured(size, kind),
        'disabled:cursor-default disabled:border-dashed disabled:border-rule disabled:bg-transparent disabled:text-ink-3',
        className,
      )}
    >
      {children}
      {waits && <span className="sr-only">, waits: {waitsFor}</span>}
    </button>
  );
}

interface ButtonLinkProps extends Omit<LinkProps, 'className'> {
  readonly kind?: ButtonKind;
  readonly size?: ButtonSize;
  readonly className?: string;
}

/** A link that looks like a button: it goes somewhere, so it stays a link for the keyboard and for "open in a new tab". */
export function ButtonLink({ kind = 'outlined', size = 'desk', className, ...rest }: ButtonLinkProps) {
  return <Link {...rest} className={classNames(shape, sized(size, kind), coloured(size, kind), className)} />;
}
