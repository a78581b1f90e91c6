/* global AbortController -- Node has it, the shared list of globals for scripts does not. */

/** @typedef {ReturnType<typeof createStoppers>} Stoppers */

/**
 * What was started and must be stopped, last first. Every command that starts something keeps one of these.
 */
export function createStoppers() {
  /** @type {Array<() => void | Promise<void>>} */
  const stoppers = [];
  /** @type {{ ending: Promise<void> | null }} */
  const state = { ending: null };
  const abort = new AbortController();

  async function stopEach() {
    abort.abort();
    for (let stop = stoppers.pop(); stop !== undefined; stop = stoppers.pop()) {
      try {
        await stop();
      } catch (error) {
        console.error(error);
      }
    }
  }

  return {
    /** @param {() => void | Promise<void>} stop */
    add(stop) {
      stoppers.push(stop);
    },
    /** Stops everything once; further calls wait for the same end. */
    stopAll() {
      state.ending ??= stopEach();
      return state.ending;
    },
    /** Ends commands that run to their end by themselves. */
    signal: abort.signal,
    get isStopping() {
      return state.ending !== null;
    },
  };
}
