import type { ReactNode } from 'react';
import { classNames } from './class-names';

interface ErrorNoteProps {
  /** What is wrong, and where. */
  readonly title: ReactNode;
  /** What to do. */
  readonly children?: ReactNode;
  /** Said at once when it appears. Off for notes that were there when the page came. */
  readonly announce?: boolean;
  readonly className?: string | undefined;
}

/**
 * A fault that belongs to more than one field. Hatched and edged, so that it is seen without colour; the words stand on plain paper
 * inside, where their contrast is certain.
 */
export function ErrorNote({ title, children, announce = true, className }: ErrorNoteProps) {
  return (
    <div
      role={announce ? 'alert' : undefined}
      className={classNames('hatched border-[1.5px] border-fault p-2 text-body', className)}
    >
      <div className="bg-paper p-2.5">
        <p className="font-strong text-fault">{title}</p>
        {children !== undefined && <div className="mt-1 text-ink">{children}</div>}
      </div>
    </div>
  );
}
