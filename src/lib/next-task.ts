/** Lets the browser do what waits, keys and drawing among it, before the work goes on. */
export function nextTask(): Promise<void> {
  return new Promise((resolve) => setTimeout(resolve, 0));
}
