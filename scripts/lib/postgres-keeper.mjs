/**
 * A small process that keeps one PostgreSQL server running and never outlives the command that started it:
 * its standard input is a pipe from that command, and when the pipe closes, even by kill -9, it shuts the database down cleanly.
 * A database that was killed is started again; one that cannot start ends the keeper.
 */
import { spawn } from 'node:child_process';
import { openSync, rmSync } from 'node:fs';
import { processesIn, waitUntil } from './processes.mjs';

const FAST_SHUTDOWN_LIMIT_MS = 15_000;
const ORPHANS_LIMIT_MS = 15_000;
const MOST_RESTARTS = 20;

/** @typedef {{ program: string, dataDirectory: string, logFile: string, settings: string[], uid?: number, gid?: number, removeAfter?: string }} KeeperConfig */

/** @type {KeeperConfig} */
const config = JSON.parse(process.argv[2] ?? '');
const log = openSync(config.logFile, 'a');
const { uid, gid } = config;
const state = { stopping: false, restarts: 0 };

function launch() {
  const child = spawn(config.program, ['-D', config.dataDirectory, ...config.settings], {
    cwd: config.dataDirectory,
    stdio: ['ignore', log, log],
    env: { PATH: process.env['PATH'], LANG: 'C', TZ: 'UTC' },
    ...(uid === undefined || gid === undefined ? {} : { uid, gid }),
  });
  child.on('error', () => finish(1));
  child.on('exit', (code) => {
    if (state.stopping) return;
    // Exit code 1 is the server's own refusal to start (a taken port, a broken setting); anything else is a crash or a kill.
    if (code === 1 || state.restarts >= MOST_RESTARTS) finish(1);
    else void restart();
  });
  return child;
}

async function restart() {
  state.restarts += 1;
  // Killed servers leave children behind for a moment; a new server must not share the data with them.
  await waitUntil(() => processesIn(config.dataDirectory).length === 0, ORPHANS_LIMIT_MS);
  if (!state.stopping) current.child = launch();
}

/** @param {number} code */
function finish(code) {
  // After a failed start the log is still to be read.
  if (code === 0 && config.removeAfter !== undefined)
    rmSync(config.removeAfter, { recursive: true, force: true, maxRetries: 5 });
  process.exit(code);
}

async function stop() {
  if (state.stopping) return;
  state.stopping = true;
  // To PostgreSQL, SIGINT means: end the sessions, write everything down, leave. SIGQUIT means: leave now, recover at the next start.
  current.child.kill('SIGINT');
  const gone = () => processesIn(config.dataDirectory).length === 0;
  if (!(await waitUntil(gone, FAST_SHUTDOWN_LIMIT_MS))) {
    current.child.kill('SIGQUIT');
    if (!(await waitUntil(gone, 5_000)))
      for (const pid of processesIn(config.dataDirectory)) process.kill(pid, 'SIGKILL');
  }
  finish(0);
}

const current = { child: launch() };
process.stdin.on('end', () => void stop());
process.stdin.on('close', () => void stop());
process.stdin.on('error', () => void stop());
process.stdin.resume();
for (const signal of ['SIGINT', 'SIGTERM', 'SIGHUP']) process.on(signal, () => void stop());
