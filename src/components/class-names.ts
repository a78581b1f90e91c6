/** Joins class names, leaving out what isn't there. */
export function classNames(...parts: readonly (string | false | null | undefined)[]): string {
  return parts.filter((part) => typeof part === 'string' && part !== '').join(' ');
}
