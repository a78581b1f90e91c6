/**
 * What `npm start` does, step by step; each step finds out by itself whether there is anything to do.
 */
import { rmSync } from 'node:fs';
import path from 'node:path';
import { performance } from 'node:perf_hooks';
import { ensureClient } from './client-build.mjs';
import { startLastingCluster } from './lasting-cluster.mjs';
import { ensurePackages } from './packages.mjs';
import { run, tail } from './run.mjs';
import { announce, claim } from './running.mjs';
import { Failure, say, sayFailure, secondsSince, step } from './say.mjs';
import { choosePort, startFake, startFakeMailbox, startServer } from './servers.mjs';
import { ensureDataDirectory, readPort, readSettings } from './settings.mjs';
import { createStoppers } from './stoppers.mjs';

/** @typedef {import('./settings.mjs').Environment} Environment */
/** @typedef {import('./stoppers.mjs').Stoppers} Stoppers */

/**
 * Runs everything until a signal says stop; answers the exit code.
 * @param {string} root
 * @returns {Promise<number>}
 */
export async function start(root) {
  const stoppers = createStoppers();
  return new Promise((resolve) => {
    const finish = (/** @type {number} */ code) => void stoppers.stopAll().then(() => resolve(code));
    // Ctrl-C may come twice, from the terminal and through npm: once is enough.
    for (const signal of ['SIGINT', 'SIGTERM', 'SIGHUP']) {
      process.on(signal, () => {
        if (!stoppers.isStopping) say('\nStopping.');
        finish(0);
      });
    }
    const giveUp = (/** @type {unknown} */ error) => {
      // What fails because it is being stopped is no news.
      if (!stoppers.isStopping) sayFailure(error);
      finish(1);
    };
    bringUp(root, stoppers, giveUp).then((isUp) => {
      if (!isUp) finish(0);
    }, giveUp);
  });
}

/**
 * @param {string} root
 * @param {Stoppers} stoppers
 * @param {(error: unknown) => void} giveUp
 * @returns {Promise<boolean>} false when this clone runs already
 */
async function bringUp(root, stoppers, giveUp) {
  const began = performance.now();
  const settings = readSettings(root);
  checkSettings(settings);
  const dataDirectory = ensureDataDirectory(root);
  const runningFile = path.join(dataDirectory, 'running.json');
  const holder = claim(runningFile);
  if (holder !== null) {
    const where = holder.url === null ? 'is just being started here' : `runs here already: ${holder.url}`;
    say(
      `Quarterturn ${where} (process ${holder.pid}). Ctrl-C in its terminal, or kill ${holder.pid}, stops it.`,
    );
    return false;
  }
  stoppers.add(() => rmSync(runningFile, { force: true }));

  const port = await choosePort(settings);
  const { signal } = stoppers;
  await step(
    'packages',
    () => ensurePackages(root, signal),
    (did) => (did ? 'Packages installed.' : null),
  );
  const urls = await databaseUrls(settings, dataDirectory, stoppers, giveUp);

  const isProduction = settings['NODE_ENV'] === 'production';
  const usesFake = settings['GITHUB_CLIENT_ID'] === undefined;
  const usesMailbox = settings['SMTP_URL'] === undefined && settings['FAKE_SMTP_URL'] === undefined;
  const publicUrl = settings['PUBLIC_URL'] ?? `http://localhost:${port}`;
  const place = { root, dataDirectory, settings, publicUrl, stoppers, onGivenUp: giveUp };
  const [fake, mailbox] = await Promise.all([
    usesFake ? startFake(place) : null,
    usesMailbox ? startFakeMailbox(place) : null,
    // The demo labs' people exist only in the stand-in.
    prepareDatabase(root, { ...settings, DATABASE_OWNER_URL: urls.ownerUrl }, usesFake, signal),
    step(
      'client',
      () => ensureClient(root, dataDirectory, signal),
      (did) => (did ? 'Client built.' : null),
    ),
  ]);
  await step(
    'server',
    () => startServer(place, { port, databaseUrl: urls.appUrl, fake, mailbox }),
    () => (stoppers.isStopping ? null : 'Server ready.'),
  );
  if (stoppers.isStopping) return true;
  announce(runningFile, publicUrl);
  await sayWelcome(publicUrl, {
    fakeUrl: fake?.url ?? null,
    mailboxUrl: mailbox?.pageUrl ?? null,
    log: isProduction ? null : path.join('.data', 'server.log'),
  });
  say(`Ready after ${secondsSince(began)}. Ctrl-C stops everything.`);
  return true;
}

/** @param {Environment} settings */
function checkSettings(settings) {
  readPort(settings['PORT'], 'PORT');
  const isSet = (/** @type {string} */ name) => settings[name] !== undefined;
  if (isSet('GITHUB_CLIENT_ID') !== isSet('GITHUB_CLIENT_SECRET')) {
    throw new Failure(
      'Only one of GITHUB_CLIENT_ID and GITHUB_CLIENT_SECRET is set.',
      'Set both to sign in through GitHub, or neither to use the local stand-in.',
    );
  }
  if (settings['NODE_ENV'] === 'production' && !isSet('GITHUB_CLIENT_ID')) {
    throw new Failure(
      'In production the local stand-in for GitHub is refused, because it lets anybody be anybody.',
      'Set GITHUB_CLIENT_ID and GITHUB_CLIENT_SECRET, or take NODE_ENV=production away to try things out.',
    );
  }
  if (isSet('FAKE_GITHUB_URL') && !isSet('GITHUB_CLIENT_ID')) {
    throw new Failure(
      'FAKE_GITHUB_URL is set without GITHUB_CLIENT_ID and GITHUB_CLIENT_SECRET, by which the stand-in there knows us.',
      'Set those two as well, or leave FAKE_GITHUB_URL out to have a stand-in started.',
    );
  }
  if (settings['NODE_ENV'] === 'production' && !isSet('SMTP_URL')) {
    throw new Failure(
      'In production the fake mailbox is refused, because nobody would get their mail.',
      'Set SMTP_URL, or take NODE_ENV=production away to try things out.',
    );
  }
  if (isSet('DATABASE_URL') !== isSet('DATABASE_OWNER_URL')) {
    throw new Failure(
      'Only one of DATABASE_URL and DATABASE_OWNER_URL is set: the server needs the one, migrations the other.',
      'Set both, to the same database with its two roles, or neither to use a private database.',
    );
  }
}

/**
 * @param {Environment} settings
 * @param {string} dataDirectory
 * @param {Stoppers} stoppers
 * @param {(error: unknown) => void} giveUp
 * @returns {Promise<{ appUrl: string, ownerUrl: string }>}
 */
async function databaseUrls(settings, dataDirectory, stoppers, giveUp) {
  const appUrl = settings['DATABASE_URL'];
  const ownerUrl = settings['DATABASE_OWNER_URL'];
  if (appUrl !== undefined && ownerUrl !== undefined) return { appUrl, ownerUrl };
  const cluster = await step(
    'database',
    () => startLastingCluster(dataDirectory),
    ({ port }) => `Database started on port ${port}.`,
  );
  if (stoppers.isStopping) {
    await cluster.stop();
    throw new Error('stopped while starting');
  }
  stoppers.add(cluster.stop);
  void cluster.ended.then(() =>
    giveUp(
      new Failure(
        'The database ended by itself.',
        `Its log: ${path.join(cluster.directory, 'postgres.log')}`,
      ),
    ),
  );
  return cluster;
}

/**
 * @param {string} root
 * @param {Environment} env
 * @param {boolean} withDemo
 * @param {AbortSignal} signal
 */
async function prepareDatabase(root, env, withDemo, signal) {
  await step(
    'prepare the database',
    async () => {
      const script = withDemo ? 'scripts/seed.ts' : 'scripts/migrate.ts';
      const done = await run(process.execPath, ['--import', 'tsx', script], { cwd: root, env, signal });
      if (done.code === 0) return done.stdout.trim().replaceAll('\n', ' ');
      throw new Failure(
        `The database could not be brought up to date:\n${tail(done.output)}`,
        'Each migration happens whole or not at all. Mend the cause, then start again.',
      );
    },
    (sentence) => (sentence === '' ? null : sentence),
  );
}

/**
 * @param {string} url
 * @param {{ fakeUrl: string | null, mailboxUrl: string | null, log: string | null }} places
 */
async function sayWelcome(url, { fakeUrl, mailboxUrl, log }) {
  say(`\nQuarterturn is at ${url}\n`);
  if (fakeUrl !== null) {
    const response = await fetch(`${fakeUrl}/demo-people`);
    /** @type {Array<{ name: string, note: string }>} */
    const people = await response.json();
    const width = Math.max(...people.map((person) => person.name.length));
    say('Sign in as one of the demo people; a local stand-in for GitHub asks which, without a password.');
    for (const person of people) say(`  ${person.name.padEnd(width)}  ${person.note}`);
    say('');
  }
  if (mailboxUrl !== null) say(`Mail goes to a local mailbox: ${mailboxUrl}`);
  if (log !== null) say(`The server's log is ${log}.`);
}
