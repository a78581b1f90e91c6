/** The first twelve digits in groups of four, as one compares them by eye; the whole hash for whoever asks. */
export function ShortHash({ hash }: { readonly hash: string }) {
  return (
    <span className="font-mono text-s whitespace-nowrap text-ink-2" title={hash}>
      {[0, 4, 8].map((from) => hash.slice(from, from + 4)).join(' ')}
    </span>
  );
}
