/**
 * Where a cluster's files live and who owns them. PostgreSQL refuses to run as root, so root hands the folder to the postgres user,
 * who may not be able to reach a clone inside somebody's home.
 */
import { createHash } from 'node:crypto';
import { chmodSync, chownSync, existsSync, mkdirSync, readFileSync, statSync } from 'node:fs';
import path from 'node:path';
import { isRoot } from './debian.mjs';
import { run } from './run.mjs';
import { Failure, say } from './say.mjs';

/**
 * @typedef {object} Identity the user that PostgreSQL runs as; empty for the caller itself
 * @property {number} [uid]
 * @property {number} [gid]
 */

/**
 * The user to run PostgreSQL as: the caller, or for root the owner of what is there already, or the postgres user.
 * @param {string} directory
 * @returns {Identity}
 */
export function databaseIdentity(directory) {
  if (!isRoot()) return {};
  if (existsSync(directory)) {
    const { uid, gid } = statSync(directory);
    if (uid !== 0) return { uid, gid };
  }
  const line = readFileSync('/etc/passwd', 'utf8')
    .split('\n')
    .find((one) => one.startsWith('postgres:'));
  const fields = line?.split(':');
  if (fields === undefined) {
    throw new Failure(
      'PostgreSQL does not run as root, and this machine has no postgres user to run it as.',
      "Install Debian's postgresql package, which makes that user, or start as an ordinary user.",
    );
  }
  return { uid: Number(fields[2]), gid: Number(fields[3]) };
}

/**
 * Makes a folder that only the database's user can read. Throws when it cannot be handed over or reached.
 * @param {string} directory
 * @param {Identity} identity
 */
async function makePrivate(directory, identity) {
  mkdirSync(directory, { recursive: true });
  if (identity.uid !== undefined && identity.gid !== undefined)
    chownSync(directory, identity.uid, identity.gid);
  chmodSync(directory, 0o700);
  const reach = await run('/usr/bin/test', ['-w', directory], { ...identity, cwd: '/' });
  if (reach.code !== 0) throw new Error(`${directory} cannot be reached by the database's user`);
}

/**
 * The folder for a clone's lasting cluster: inside `dataDirectory` when the database's user can get there, else under /var/lib.
 * @param {string} dataDirectory the clone's .data
 * @returns {Promise<string>}
 */
export async function placeForCluster(dataDirectory) {
  const inClone = path.join(dataDirectory, 'postgres');
  if (await prepare(inClone)) return inClone;
  const name = createHash('sha256').update(dataDirectory).digest('hex').slice(0, 12);
  const outside = `/var/lib/quarterturn-${name}`;
  if (await prepare(outside)) {
    say(`The database's own user cannot reach this folder, so its files are in ${outside}.`);
    return outside;
  }
  throw new Failure(
    `Neither ${inClone} nor ${outside} can be used for the database's files.`,
    'Put the clone on a disk where files can be written and owned by another user, or start as an ordinary user.',
  );
}

/**
 * @param {string} directory
 * @returns {Promise<boolean>}
 */
export async function prepare(directory) {
  const identity = databaseIdentity(directory);
  try {
    await makePrivate(directory, identity);
    return true;
  } catch {
    return false;
  }
}
