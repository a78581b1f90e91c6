import { existsSync, readdirSync, readFileSync } from 'node:fs';
import path from 'node:path';
import { installPostgres } from './debian.mjs';
import { run } from './run.mjs';
import { Failure } from './say.mjs';

const DEBIAN_HOME = '/usr/lib/postgresql';
const OLDEST_MAJOR = 15;

/**
 * @typedef {object} PostgresBinaries
 * @property {string} directory where initdb, postgres and psql are
 * @property {number} major
 */

/**
 * PostgreSQL's programs as Debian lays them out, newest first, then whatever `pg_config` names.
 * @param {number} [major] only this major version
 * @returns {Promise<PostgresBinaries | null>}
 */
export async function findPostgres(major) {
  const found = existsSync(DEBIAN_HOME)
    ? readdirSync(DEBIAN_HOME).map((name) => ({
        directory: path.join(DEBIAN_HOME, name, 'bin'),
        major: Number(name),
      }))
    : [];
  const config = await run('pg_config', ['--bindir', '--version']);
  if (config.code === 0) {
    const [directory = '', version = ''] = config.stdout.trim().split('\n');
    found.push({ directory, major: Number(/\d+/.exec(version)?.[0] ?? Number.NaN) });
  }
  const usable = found
    .filter((one) => one.major >= OLDEST_MAJOR && (major === undefined || one.major === major))
    .filter((one) =>
      ['initdb', 'postgres', 'psql'].every((name) => existsSync(path.join(one.directory, name))),
    )
    .sort((a, b) => b.major - a.major);
  return usable[0] ?? null;
}

/**
 * The programs to open a data directory with: the version that made it, or the newest for a new one; installs Debian's package when there is none.
 * @param {string} dataDirectory
 * @returns {Promise<PostgresBinaries>}
 */
export async function ensurePostgres(dataDirectory) {
  const versionFile = path.join(dataDirectory, 'PG_VERSION');
  if (existsSync(versionFile)) {
    const major = Number(readFileSync(versionFile, 'utf8').trim());
    const matching = await findPostgres(major);
    if (matching !== null) return matching;
    throw new Failure(
      `The database in ${dataDirectory} was made by PostgreSQL ${major}, which is not installed on this machine.`,
      `Install it (apt-get install postgresql-${major}), or move that folder away to begin with an empty database.`,
    );
  }
  const present = await findPostgres();
  if (present !== null) return present;
  await installPostgres();
  const installed = await findPostgres();
  if (installed !== null) return installed;
  throw new Failure(
    `PostgreSQL ${OLDEST_MAJOR} or newer is needed, and this system's package did not bring it.`,
    `Install PostgreSQL ${OLDEST_MAJOR} or newer so that ${DEBIAN_HOME}/<version>/bin exists, then start again.`,
  );
}
