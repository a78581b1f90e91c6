import type { ReactNode } from 'react';

/** One line of a list of facts. */
export function Fact({ name, children }: { readonly name: string; readonly children: ReactNode }) {
  return (
    <div className="border-hair grid grid-cols-[6rem_1fr] gap-3 border-b py-2">
      <dt className="text-ink-2">{name}</dt>
      <dd className="min-w-0 break-words">{children}</dd>
    </div>
  );
}
