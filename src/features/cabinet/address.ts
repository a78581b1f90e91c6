/** A path with what is asked of it; what is not given or empty is left out. */
export function withQuery(
  path: string,
  query: Readonly<Record<string, string | number | null | undefined>>,
): string {
  const asked = new URLSearchParams();
  for (const [name, value] of Object.entries(query)) {
    if (value !== null && value !== undefined && value !== '') asked.set(name, String(value));
  }
  const text = asked.toString();
  return text === '' ? path : `${path}?${text}`;
}
