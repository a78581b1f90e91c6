/**
 * Loaded into a server with --import: its standard input is a pipe from the start command, and when the pipe closes, however that
 * command ended, the server is told to stop as by SIGTERM. One that does not stop is ended.
 */
import { isMainThread } from 'node:worker_threads';

const LIMIT_MS = 12_000;

if (isMainThread) {
  process.stdin.once('close', () => {
    process.kill(process.pid, 'SIGTERM');
    setTimeout(() => process.kill(process.pid, 'SIGKILL'), LIMIT_MS).unref();
  });
  process.stdin.on('error', () => undefined);
  process.stdin.resume();
  // Watching must not keep a server alive that has closed everything else.
  if ('unref' in process.stdin && typeof process.stdin.unref === 'function') process.stdin.unref();
}
