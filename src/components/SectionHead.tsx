import type { ReactNode } from 'react';
import { classNames } from './class-names';

interface SectionHeadProps {
  readonly children: ReactNode;
  /** Second words beside the head. */
  readonly note?: ReactNode;
  /** A way on, at the right end. */
  readonly action?: ReactNode;
  readonly level?: 2 | 3;
  /** Large for the two or three parts of a page like home, small for many heads on one page. */
  readonly size?: 'small' | 'section' | 'large';
  readonly id?: string | undefined;
  readonly className?: string | undefined;
}

const sizes = {
  small: 'text-[0.9375rem] leading-5.5 font-section',
  section: 'text-section',
  large: 'text-[1.375rem] leading-7 font-title',
} as const;

/** A section opens with an ink rule above its head, never a box. */
export function SectionHead({
  children,
  note,
  action,
  level = 2,
  size = 'section',
  id,
  className,
}: SectionHeadProps) {
  const Head = level === 2 ? 'h2' : 'h3';
  return (
    <div
      className={classNames(
        'flex flex-wrap items-baseline gap-x-4 gap-y-1 border-t-[1.5px] border-ink pt-1.5',
        className,
      )}
    >
      <Head id={id} className={sizes[size]}>
        {children}
      </Head>
      {note !== undefined && <span className="text-s text-ink-2">{note}</span>}
      {action !== undefined && <span className="ml-auto">{action}</span>}
    </div>
  );
}
