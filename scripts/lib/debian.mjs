import { existsSync } from 'node:fs';
import { run, tail } from './run.mjs';
import { Failure, say } from './say.mjs';

const APT = ['-y', '--no-install-recommends', '-o', 'DPkg::Lock::Timeout=300', 'install'];

// Debian's postgresql package starts a cluster of its own on port 5432 unless this says no; ours is private.
const CLUSTER_CONFIG = '/etc/postgresql-common/createcluster.conf';

/** @returns {boolean} */
export function isRoot() {
  return process.getuid?.() === 0;
}

/**
 * How to run a command as root without asking anybody: directly, through sudo, or not at all (null).
 * @returns {Promise<readonly string[] | null>} the words to put before the command
 */
async function rootPrefix() {
  if (isRoot()) return [];
  const sudo = await run('sudo', ['-n', 'true']);
  return sudo.code === 0 ? ['sudo', '-n'] : null;
}

/**
 * @param {readonly string[]} prefix
 * @param {readonly string[]} words
 */
async function runAsRoot(prefix, words) {
  const all = [...prefix, 'env', 'DEBIAN_FRONTEND=noninteractive', ...words];
  const [command, ...args] = all;
  if (command === undefined) throw new Error('no command was given');
  return run(command, args);
}

/**
 * Installs Debian packages, as root or through sudo; says the one command to run when neither is possible.
 * @param {readonly string[]} packages
 * @param {string} purpose completes "… is needed"
 */
export async function installDebianPackages(packages, purpose) {
  const byHand = `apt-get update && apt-get install -y ${packages.join(' ')}`;
  if (!existsSync('/usr/bin/apt-get')) {
    throw new Failure(
      `${purpose} is needed, and this machine has no apt-get to install it with.`,
      `Install ${packages.join(' and ')} with this system's own package manager, then run the command again.`,
    );
  }
  const prefix = await rootPrefix();
  if (prefix === null) {
    throw new Failure(
      `${purpose} is needed and is not installed; installing it takes an administrator.`,
      `Run this once as an administrator, then start again:\n\n  sudo sh -c '${byHand}'`,
    );
  }
  say(`Installing Debian's ${packages.join(' and ')}: this can take some minutes.`);
  const update = await runAsRoot(prefix, ['apt-get', 'update']);
  const install = await runAsRoot(prefix, ['apt-get', ...APT, ...packages]);
  if (install.code !== 0) {
    const why = update.code === 0 ? install.output : `${tail(update.output, 6)}\n${install.output}`;
    throw new Failure(
      `Debian's ${packages.join(' and ')} could not be installed:\n${tail(why)}`,
      `Try by hand: ${byHand}`,
    );
  }
}

/**
 * Installs Debian's PostgreSQL without letting it create or start a cluster of its own; its settings are as before afterwards.
 */
export async function installPostgres() {
  const prefix = await rootPrefix();
  if (prefix !== null && existsSync('/usr/bin/apt-get')) {
    await installDebianPackages(['postgresql-common'], 'PostgreSQL');
    await runAsRoot(prefix, [
      'sh',
      '-c',
      `cp -p ${CLUSTER_CONFIG} ${CLUSTER_CONFIG}.quarterturn && echo 'create_main_cluster = false' >> ${CLUSTER_CONFIG}`,
    ]);
  }
  try {
    await installDebianPackages(['postgresql'], 'PostgreSQL');
  } finally {
    if (prefix !== null && existsSync(`${CLUSTER_CONFIG}.quarterturn`)) {
      await runAsRoot(prefix, ['mv', `${CLUSTER_CONFIG}.quarterturn`, CLUSTER_CONFIG]);
    }
  }
}
