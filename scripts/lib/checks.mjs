import { spawn } from 'node:child_process';
import { readFileSync } from 'node:fs';
import path from 'node:path';
import { performance } from 'node:perf_hooks';

/**
 * @typedef {object} Outcome of one step of the test command
 * @property {string} name
 * @property {boolean} isFine
 * @property {number} seconds
 * @property {Counts} counts
 */

/** @typedef {{ passed: number, failed: number, skipped: number }} Counts */

/**
 * @typedef {object} Surroundings
 * @property {string} root
 * @property {Record<string, string | undefined>} env
 * @property {string} directory for reports
 * @property {AbortSignal} signal
 */

/**
 * Runs a command in a process group of its own, so that everything it started ends with it when the run is interrupted.
 * @param {readonly string[]} args arguments to node
 * @param {Surroundings} surroundings
 * @param {boolean} show whether its output goes through or is collected
 * @returns {Promise<{ code: number, output: string }>}
 */
function runGroup(args, { root, env, signal }, show) {
  return new Promise((resolve) => {
    const out = show ? 'inherit' : 'pipe';
    const child = spawn(process.execPath, args, {
      cwd: root,
      env,
      detached: true,
      stdio: ['ignore', out, out],
    });
    let output = '';
    for (const stream of [child.stdout, child.stderr]) {
      stream?.on('data', (chunk) => {
        output += String(chunk);
      });
    }
    const end = () => {
      killGroup(child.pid, 'SIGTERM');
      setTimeout(() => killGroup(child.pid, 'SIGKILL'), 3_000).unref();
    };
    signal.addEventListener('abort', end, { once: true });
    if (signal.aborted) end();
    child.on('error', (error) => resolve({ code: 127, output: error.message }));
    child.on('close', (code) => {
      signal.removeEventListener('abort', end);
      resolve({ code: code ?? 128, output });
    });
  });
}

/**
 * @param {number | undefined} leader
 * @param {NodeJS.Signals} signal
 */
function killGroup(leader, signal) {
  try {
    if (leader !== undefined) process.kill(-leader, signal);
  } catch {
    // The group has ended already.
  }
}

/**
 * A check that passes or fails as a whole. What it says is shown when it fails; a failed check counts as one failure.
 * @param {string} name
 * @param {readonly string[]} args
 * @param {Surroundings} surroundings
 * @returns {Promise<Outcome>}
 */
export async function check(name, args, surroundings) {
  const started = performance.now();
  const { code, output } = await runGroup(args, surroundings, false);
  const isFine = code === 0;
  if (!isFine && !surroundings.signal.aborted) console.log(`\n${name} found this:\n${output.trimEnd()}\n`);
  return report(
    name,
    isFine,
    started,
    { passed: 0, failed: isFine ? 0 : 1, skipped: 0 },
    surroundings.signal,
  );
}

/**
 * Runs vitest and counts what it ran.
 * @param {string} name
 * @param {readonly string[]} args
 * @param {Surroundings} surroundings
 * @param {boolean} [show]
 * @returns {Promise<Outcome>}
 */
export async function vitest(name, args, surroundings, show = false) {
  const started = performance.now();
  const file = path.join(surroundings.directory, `${name.replaceAll(/\W+/g, '-')}.json`);
  const all = [
    ...['node_modules/vitest/vitest.mjs', 'run', '--passWithNoTests'],
    ...['--reporter=default', '--reporter=json', `--outputFile.json=${file}`, ...args],
  ];
  const { code, output } = await runGroup(all, surroundings, show);
  const counts = readCounts(file);
  // A run that failed without a failed test (an error outside of tests, a crash) is a failure all the same.
  if (code !== 0 && counts.failed === 0) counts.failed = 1;
  const isFine = counts.failed === 0;
  if (!isFine && !show && !surroundings.signal.aborted) console.log(`\n${name}:\n${output.trimEnd()}\n`);
  return report(name, isFine, started, counts, surroundings.signal);
}

/**
 * @param {string} file
 * @returns {Counts}
 */
function readCounts(file) {
  try {
    const { numPassedTests, numFailedTests, numPendingTests, numTodoTests, testResults } = JSON.parse(
      readFileSync(file, 'utf8'),
    );
    // A file that could not even be loaded has no test to fail.
    const unloaded = testResults.filter(
      (/** @type {{ status: string, assertionResults: unknown[] }} */ one) =>
        one.status === 'failed' && one.assertionResults.length === 0,
    ).length;
    return {
      passed: numPassedTests,
      failed: numFailedTests + unloaded,
      skipped: numPendingTests + numTodoTests,
    };
  } catch {
    return { passed: 0, failed: 0, skipped: 0 };
  }
}

/**
 * @param {string} name
 * @param {boolean} isFine
 * @param {number} started
 * @param {Counts} counts
 * @param {AbortSignal} signal
 * @returns {Outcome}
 */
function report(name, isFine, started, counts, signal) {
  const outcome = { name, isFine, seconds: (performance.now() - started) / 1000, counts };
  // What ends because the run was interrupted has not failed.
  if (!signal.aborted) console.log(describe(outcome));
  return outcome;
}

/** @param {Outcome} outcome */
function describe({ name, isFine, seconds, counts }) {
  const ran = counts.passed + counts.failed + counts.skipped;
  const tests = ran === 0 || (counts.passed === 0 && counts.failed === 1) ? '' : `, ${ran} tests`;
  return `${isFine ? 'fine  ' : 'FAILED'}  ${name} (${seconds.toFixed(1)} s${tests})`;
}

/**
 * The closing lines: one a step, then the sum alone on its line.
 * @param {readonly Outcome[]} outcomes
 */
export function summary(outcomes) {
  const sum = (/** @type {keyof Counts} */ key) =>
    outcomes.reduce((total, { counts }) => total + counts[key], 0);
  const skipped = sum('skipped') > 0 ? `, ${sum('skipped')} skipped` : '';
  return [...outcomes.map(describe), '', `${sum('passed')} passed, ${sum('failed')} failed${skipped}`].join(
    '\n',
  );
}
