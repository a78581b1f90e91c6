/** Characters from the point on, the bracket included; 0 for a whole number. */
function fractionLength(text: string): number {
  const point = text.indexOf('.');
  return point < 0 ? 0 : text.length - point;
}

export function widestFraction(texts: readonly string[]): number {
  return Math.max(0, ...texts.map(fractionLength));
}

/** A number of a right-aligned column, filled up unseen so that the points stand under each other. */
export function OnPoint({ text, widest }: { readonly text: string; readonly widest: number }) {
  const missing = widest - fractionLength(text);
  return (
    <>
      {text}
      {missing > 0 && (
        <span aria-hidden="true" className="invisible select-none">
          {'0'.repeat(missing)}
        </span>
      )}
    </>
  );
}
