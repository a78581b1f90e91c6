import { mkdtempSync, rmSync } from 'node:fs';
import { tmpdir } from 'node:os';
import path from 'node:path';
import { newPasswords, startCluster } from './postgres.mjs';

/**
 * A cluster for one test run in a temporary folder; the folder goes when the cluster stops, or when the process that asked for it dies.
 * @param {{ durable?: boolean }} [options] durable waits for the disk as a real one does
 * @returns {Promise<import('./postgres.mjs').Cluster>}
 */
export async function startThrowawayCluster(options = {}) {
  const directory = mkdtempSync(path.join(tmpdir(), 'quarterturn-test-'));
  try {
    return await startCluster({
      directory,
      passwords: newPasswords(),
      durable: options.durable ?? false,
      removeWhenStopped: true,
    });
  } catch (error) {
    rmSync(directory, { recursive: true, force: true });
    throw error;
  }
}
