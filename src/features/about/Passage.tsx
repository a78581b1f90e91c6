import { type ReactNode, useId } from 'react';

/** A section of a page that is read from top to bottom: an ink rule, a head, and text at reading size. */
export function Passage({ title, children }: { readonly title: string; readonly children: ReactNode }) {
  const headId = useId();
  return (
    <section aria-labelledby={headId} className="border-ink mt-8 border-t-[1.5px] pt-4">
      <h2 id={headId} className="text-section mb-2">
        {title}
      </h2>
      <div className="text-home text-ink space-y-3">{children}</div>
    </section>
  );
}
