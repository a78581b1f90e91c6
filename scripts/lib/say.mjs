/**
 * What a person reads while a command works: plain sentences, one a line, and failures that say what to do.
 * Everything under scripts/lib is plain JavaScript on Node's own modules, because it runs before any package is installed.
 */
import { performance } from 'node:perf_hooks';

/** A step that could not be done: `what` failed and `remedy`, what the reader can do about it. */
export class Failure extends Error {
  /**
   * @param {string} what
   * @param {string} remedy
   */
  constructor(what, remedy) {
    super(what);
    this.name = 'Failure';
    this.remedy = remedy;
  }
}

/** @param {string} line */
export function say(line) {
  console.log(line);
}

/**
 * The seconds since `startedMs` (a `performance.now()`), as the reader sees them.
 * @param {number} startedMs
 */
export function secondsSince(startedMs) {
  return `${((performance.now() - startedMs) / 1000).toFixed(1)} s`;
}

/**
 * Runs one named step and says how long it took; a step may answer a sentence to use instead of its name.
 * @template T
 * @param {string} name
 * @param {() => Promise<T>} work
 * @param {(result: T) => string | null} [describe] what to say when done; null says nothing, as for a step with nothing to do
 * @returns {Promise<T>}
 */
export async function step(name, work, describe) {
  const started = performance.now();
  const result = await work();
  const line = describe === undefined ? name : describe(result);
  if (line !== null) say(`${line} (${secondsSince(started)})`);
  return result;
}

/**
 * Prints a failure: what failed, then what to do; an unforeseen error keeps its stack, since nobody foresaw it.
 * @param {unknown} error
 */
export function sayFailure(error) {
  if (error instanceof Failure) {
    console.error(`\n${error.message}\n\n${error.remedy}`);
  } else {
    console.error('\nSomething failed that these scripts did not foresee:');
    console.error(error);
  }
}
