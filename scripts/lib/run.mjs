import { spawn } from 'node:child_process';

/**
 * @typedef {object} RunOptions
 * @property {string} [cwd]
 * @property {Record<string, string | undefined>} [env] the whole environment; the caller's own when left out
 * @property {string} [input] written to standard input, which is closed after it
 * @property {number} [uid] run as this user (root only)
 * @property {number} [gid]
 * @property {AbortSignal} [signal] ends the command with SIGTERM
 * @property {boolean} [show] let its output through instead of collecting it
 */

/**
 * @typedef {object} RunResult
 * @property {number} code exit code; 127 when the command could not be started, 128 when a signal ended it
 * @property {string} output standard output and error in the order they came
 * @property {string} stdout
 */

/**
 * Runs a command to its end and never throws for its exit code: the caller knows what a failure means.
 * @param {string} command
 * @param {readonly string[]} args
 * @param {RunOptions} [options]
 * @returns {Promise<RunResult>}
 */
export function run(command, args, options = {}) {
  return new Promise((resolve) => {
    const { input, show = false, ...rest } = options;
    let output = '';
    let stdout = '';
    const child = spawn(command, args, {
      ...rest,
      stdio: ['pipe', show ? 'inherit' : 'pipe', show ? 'inherit' : 'pipe'],
    });
    child.stdout?.on('data', (chunk) => {
      output += String(chunk);
      stdout += String(chunk);
    });
    child.stderr?.on('data', (chunk) => {
      output += String(chunk);
    });
    child.on('error', (error) => {
      resolve({ code: 127, output: `${output}${error.message}`, stdout });
    });
    child.on('close', (code) => {
      resolve({ code: code ?? 128, output, stdout });
    });
    // A command that exits without reading its input breaks the pipe; its exit code tells the story.
    child.stdin?.on('error', () => undefined);
    child.stdin?.end(input ?? '');
  });
}

/**
 * The last lines of a command's output, enough to see why it failed.
 * @param {string} output
 * @param {number} [lines]
 */
export function tail(output, lines = 15) {
  return output.trimEnd().split('\n').slice(-lines).join('\n');
}
