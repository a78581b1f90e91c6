/** What this browser keeps under a name; null where that is nothing, is broken, or where it keeps nothing. */
export function kept(name: string): unknown {
  try {
    return JSON.parse(localStorage.getItem(name) ?? 'null');
  } catch {
    return null;
  }
}

/** @returns false where the browser can't keep it. */
export function keep(name: string, value: unknown): boolean {
  try {
    localStorage.setItem(name, JSON.stringify(value));
    return true;
  } catch {
    return false;
  }
}

/** Does nothing where the browser keeps nothing. */
export function drop(name: string): void {
  try {
    localStorage.removeItem(name);
  } catch {
    // Where nothing can be kept there is nothing to forget.
  }
}
