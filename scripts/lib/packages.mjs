import { createHash } from 'node:crypto';
import { existsSync, readFileSync, writeFileSync } from 'node:fs';
import path from 'node:path';
import { run, tail } from './run.mjs';
import { Failure, say } from './say.mjs';

/**
 * Installs the packages of package-lock.json unless the ones present came from this very lock file.
 * @param {string} root
 * @param {AbortSignal} signal
 * @returns {Promise<boolean>} whether anything was installed
 */
export async function ensurePackages(root, signal) {
  const lock = createHash('sha256')
    .update(readFileSync(path.join(root, 'package-lock.json')))
    .digest('hex');
  // Inside node_modules, so that it goes when they go: npm empties the folder before it installs.
  const record = path.join(root, 'node_modules', '.quarterturn-lock');
  if (existsSync(record) && readFileSync(record, 'utf8').trim() === lock) return false;
  say('Installing packages: the first time this takes a minute or so.');
  // A production setting must not leave out what builds the client.
  const installed = await run('npm', ['ci', '--include=dev', '--no-audit', '--no-fund'], {
    cwd: root,
    signal,
  });
  if (installed.code !== 0) {
    throw new Failure(
      `The packages could not be installed. npm ends with:\n${tail(installed.output)}`,
      'They come from the npm registry, so this machine must reach it once. Then start again.',
    );
  }
  writeFileSync(record, lock);
  return true;
}
