import { spawn } from 'node:child_process';
import { closeSync, existsSync, openSync, readFileSync, renameSync, statSync } from 'node:fs';
import path from 'node:path';
import { setTimeout as sleep } from 'node:timers/promises';
import { fileURLToPath } from 'node:url';
import { Failure, say } from './say.mjs';
import { tail } from './run.mjs';

const STOP_WITH_PARENT = fileURLToPath(new URL('stop-with-parent.mjs', import.meta.url));
const READY_LIMIT_MS = 60_000;
// The server gives itself ten seconds to finish what is under way.
const STOP_LIMIT_MS = 12_000;
const MOST_RESTARTS_A_MINUTE = 5;
const LARGEST_LOG_BYTES = 20_000_000;

/**
 * @typedef {object} ServiceOptions
 * @property {string} name as a person calls it, beginning a sentence
 * @property {string} root
 * @property {string} entry the TypeScript file to run
 * @property {Record<string, string | undefined>} env
 * @property {string | null} logFile where its output goes; null lets it through
 * @property {string} readyUrl answers 200 when it is ready
 * @property {(failure: Failure) => void} onGivenUp it keeps ending by itself
 * @property {import('./stoppers.mjs').Stoppers} stoppers learns how to stop it as soon as there is something to stop
 */

/** The service ended because another program listens on its port. */
export class PortTaken extends Error {}

/**
 * Starts a server of ours, waits until it is ready and starts it again when it ends by itself.
 * @param {ServiceOptions} options
 */
export async function startService(options) {
  const { name, logFile } = options;
  if (logFile !== null && existsSync(logFile) && statSync(logFile).size > LARGEST_LOG_BYTES)
    renameSync(logFile, `${logFile}.1`);
  const state = { stopping: false, ready: false, child: launch(options) };
  /** @type {number[]} */
  const restarts = [];

  const stop = async () => {
    state.stopping = true;
    const { child } = state;
    if (hasEnded(child)) return;
    const ended = new Promise((resolve) => child.once('exit', resolve));
    child.kill('SIGTERM');
    const timer = setTimeout(() => child.kill('SIGKILL'), STOP_LIMIT_MS);
    await ended;
    clearTimeout(timer);
  };

  options.stoppers.add(stop);

  const watch = () => {
    state.child.once('exit', (code, signal) => {
      if (state.stopping || !state.ready) return;
      const now = Date.now();
      restarts.push(now);
      const recent = restarts.filter((at) => now - at < 60_000).length;
      const how = signal === null ? `with exit code ${code}` : `by ${signal}`;
      if (recent > MOST_RESTARTS_A_MINUTE) {
        options.onGivenUp(
          new Failure(
            `${name} keeps ending (${how}).${logTail(logFile, 0)}`,
            `Its log: ${logFile ?? 'above'}`,
          ),
        );
        return;
      }
      say(`${name} ended ${how}; starting it again.`);
      state.child = launch(options);
      watch();
    });
  };
  watch();

  const logStart = logFile !== null && existsSync(logFile) ? statSync(logFile).size : 0;
  const deadline = Date.now() + READY_LIMIT_MS;
  while (!(await answers(options.readyUrl))) {
    if (hasEnded(state.child)) {
      if (state.stopping) return;
      const log = logTail(logFile, logStart);
      if (/EADDRINUSE/.test(log)) throw new PortTaken(name);
      throw new Failure(`${name} ended while it was starting.${log}`, 'The lines above say what it missed.');
    }
    if (Date.now() > deadline) {
      await stop();
      throw new Failure(
        `${name} did not become ready within a minute.${logTail(logFile, logStart)}`,
        `Its log: ${logFile ?? 'above'}`,
      );
    }
    await sleep(40);
  }
  state.ready = true;
}

/** @param {ServiceOptions} options */
function launch({ root, entry, env, logFile }) {
  const log = logFile === null ? 'inherit' : openSync(logFile, 'a', 0o600);
  // Its own process group: Ctrl-C reaches only the start command, which then stops everything in order.
  const child = spawn(
    process.execPath,
    ['--import', 'tsx', '--import', STOP_WITH_PARENT, path.join(root, entry)],
    {
      cwd: root,
      env,
      detached: true,
      stdio: ['pipe', log, log],
    },
  );
  child.stdin?.on('error', () => undefined);
  if (typeof log === 'number') closeSync(log);
  return child;
}

/** @param {import('node:child_process').ChildProcess} child */
function hasEnded(child) {
  return child.exitCode !== null || child.signalCode !== null;
}

/**
 * @param {string} url
 * @returns {Promise<boolean>}
 */
async function answers(url) {
  try {
    const response = await fetch(url, { signal: AbortSignal.timeout(2_000) });
    await response.arrayBuffer();
    return response.ok;
  } catch {
    return false;
  }
}

/**
 * The end of what the service wrote since it was started, ready to follow a sentence.
 * @param {string | null} logFile
 * @param {number} from bytes to pass over
 */
function logTail(logFile, from) {
  if (logFile === null || !existsSync(logFile)) return '';
  const text = readFileSync(logFile).subarray(from).toString('utf8').trim();
  return text === '' ? '' : ` It wrote:\n${tail(text, 12)}`;
}
