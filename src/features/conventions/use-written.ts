import { useEffect, useState } from 'react';
import { NavigationType, useLocation, useNavigationType, useSearchParams } from 'react-router-dom';
import { addressSearch, readAddress, type WrittenKind } from './address';
import type { Chosen } from './compared-rows';

/** Where a first visit begins. */
const begins: Readonly<Record<WrittenKind, string>> = {
  state: 'ellipse(30deg, 20deg)',
  unitary: 'qwp(45deg)',
};

// Some browsers stop a page that changes its address more than some three times a second.
const ADDRESS_AFTER_MS = 300;

interface Written {
  readonly kind: WrittenKind;
  readonly sources: Readonly<Record<WrittenKind, string>>;
  /** Null until a convention was chosen, here or by the address. */
  readonly chosen: Chosen | null;
  /** What the address names as a convention and nobody knows. */
  readonly unknown: string | null;
}

function writtenAt(search: URLSearchParams, before: Written['sources']): Written {
  const { kind, source, chosen, unknown } = readAddress(search);
  return { kind, sources: { ...before, [kind]: source ?? begins[kind] }, chosen, unknown };
}

/**
 * What is written on the page and in which convention, with the page's address kept up to date (replaced, never pushed), so
 * that it can be sent. Going back or following a link to another address takes over what stands there.
 * @param fallback what it is read in until a convention is chosen; null while that isn't known, and the address waits.
 */
export function useWritten(fallback: Chosen | null) {
  const [search, setSearch] = useSearchParams();
  const { key } = useLocation();
  const navigation = useNavigationType();
  const [written, setWritten] = useState(() => writtenAt(search, begins));
  const [seenKey, setSeenKey] = useState(key);
  if (key !== seenKey) {
    setSeenKey(key);
    // Only this page replaces its own address, and then what is typed may already be further on.
    if (navigation !== NavigationType.Replace) setWritten(writtenAt(search, written.sources));
  }

  const { kind, sources } = written;
  const source = sources[kind];
  const chosen = written.chosen ?? fallback;
  // A convention that nobody knows stays in the address until another is chosen: ours would change what was meant.
  const waits = written.unknown !== null;
  const address = chosen === null || waits ? null : addressSearch(kind, source, chosen).toString();
  const stands = search.toString();
  useEffect(() => {
    if (address === null || address === stands) return undefined;
    const timer = window.setTimeout(() => {
      setSearch(address, { replace: true, preventScrollReset: true });
    }, ADDRESS_AFTER_MS);
    return () => window.clearTimeout(timer);
  }, [address, stands, setSearch]);

  return {
    kind,
    source,
    chosen,
    unknown: written.unknown,
    setKind: (next: WrittenKind) => setWritten({ ...written, kind: next }),
    setSource: (next: string) => setWritten({ ...written, sources: { ...sources, [kind]: next } }),
    setChosen: (next: Chosen) => setWritten({ ...written, chosen: next, unknown: null }),
  };
}
