import { chmodSync, mkdtempSync, rmSync } from 'node:fs';
import { tmpdir } from 'node:os';
import path from 'node:path';
import { newPasswords, startCluster } from './postgres.mjs';

/**
 * A temporary folder that the database's user may pass through.
 * @returns {string}
 */
export function makeTemporaryDirectory() {
  const directory = mkdtempSync(path.join(tmpdir(), 'quarterturn-test-'));
  chmodSync(directory, 0o711);
  return directory;
}

/**
 * A cluster for one test run in a temporary folder; the folder goes when the cluster stops, or when the process that asked for it dies.
 * @param {{ durable?: boolean, directory?: string }} [options] durable waits for the disk as a real one does; the folder is made when not given
 * @returns {Promise<import('./postgres.mjs').Cluster>}
 */
export async function startThrowawayCluster(options = {}) {
  const directory = options.directory ?? makeTemporaryDirectory();
  try {
    return await startCluster({
      directory: path.join(directory, 'cluster'),
      passwords: newPasswords(),
      durable: options.durable ?? false,
      removeWhenStopped: directory,
    });
  } catch (error) {
    rmSync(directory, { recursive: true, force: true });
    throw error;
  }
}
