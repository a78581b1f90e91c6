import { existsSync, readFileSync } from 'node:fs';
import path from 'node:path';
import { newPasswords, startCluster } from './postgres.mjs';
import { ensurePostgres } from './postgres-binaries.mjs';
import { placeForCluster } from './postgres-place.mjs';
import { Failure } from './say.mjs';
import { keepSecret } from './settings.mjs';

const PREFERRED_PORT = 4620;

/**
 * Starts the cluster that this clone keeps, making it the first time. Its place and passwords are in .data/database.json, for its owner's eyes only.
 * @param {string} dataDirectory
 * @returns {Promise<import('./postgres.mjs').Cluster>}
 */
export async function startLastingCluster(dataDirectory) {
  const file = path.join(dataDirectory, 'database.json');
  // Decided once: a later start must find the data where the first one put it.
  if (!existsSync(file)) {
    // First the package, which brings the user that root's cluster belongs to.
    await ensurePostgres(path.join(dataDirectory, 'postgres', 'data'));
    const place = await placeForCluster(dataDirectory);
    keepSecret(file, () => JSON.stringify({ place, passwords: newPasswords() }));
  }
  const { place, passwords } = readRecord(file, readFileSync(file, 'utf8'));
  return startCluster({
    directory: place,
    passwords,
    durable: true,
    preferredPort: PREFERRED_PORT,
  });
}

/**
 * @param {string} file
 * @param {string} text
 * @returns {{ place: string, passwords: import('./postgres.mjs').Passwords }}
 */
function readRecord(file, text) {
  try {
    const { place, passwords } = JSON.parse(text);
    const all = [place, passwords.admin, passwords.owner, passwords.app];
    if (all.every((one) => typeof one === 'string' && one !== '')) return { place, passwords };
  } catch {
    // Falls through to the one sentence that serves every kind of damage.
  }
  throw new Failure(
    `The file ${file} is damaged, and the database's passwords are in it.`,
    'Put back a copy of it, or move .data away to begin with an empty database.',
  );
}
