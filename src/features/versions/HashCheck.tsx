import { useMemo } from 'react';
import { contentHash } from '../../../shared/protocol/canonical-json';
import type { Version } from '../../../shared/schemas/versions';

/** The hash worked out again on this page, from the very text, beside the one that the server keeps. */
export function HashCheck({ version }: { readonly version: Version }) {
  const { summary, content, canonicalJson, parentHash } = version;
  const own = useMemo(() => contentHash(canonicalJson), [canonicalJson]);
  const agrees = own === summary.contentHash;
  return (
    <section aria-label="Content hash" className="mt-10 border-t border-ink pt-3 text-s text-ink-2">
      <p className="m-0">
        Content <span className="font-mono break-all text-ink">{summary.contentHash}</span>,{' '}
        {parentHash === null ? (
          'the first of its chain.'
        ) : (
          <>
            on <span className="font-mono break-all text-ink">{parentHash}</span> of version{' '}
            {content.number - 1}.
          </>
        )}
      </p>
      <p className="mt-1 mb-0">
        Solver {content.solverVersion}.{' '}
        {agrees ? (
          'Hashed again on this page from the text of the version: it agrees.'
        ) : (
          <strong className="text-fault">
            Hashed again on this page the text gives {own}: this version is not what was saved. Tell the lab’s
            lead before anything is run from it.
          </strong>
        )}
      </p>
    </section>
  );
}
