/**
 * What `npm test` does: sets up what is missing, then format, lint, types and every test against a throwaway database.
 */
import { mkdirSync, readdirSync, rmSync } from 'node:fs';
import path from 'node:path';
import { performance } from 'node:perf_hooks';
import { check, summary, vitest } from './checks.mjs';
import { ensureChromium } from './chromium.mjs';
import { ensureClient } from './client-build.mjs';
import { ensurePackages } from './packages.mjs';
import { say, sayFailure, secondsSince, step } from './say.mjs';
import { ensureDataDirectory } from './settings.mjs';
import { createStoppers } from './stoppers.mjs';
import { makeTemporaryDirectory, startThrowawayCluster } from './throwaway-cluster.mjs';

// A developer's own settings must not reach into the tests.
const NOT_FOR_TESTS = [
  'DATABASE_URL',
  'DATABASE_OWNER_URL',
  'GITHUB_CLIENT_ID',
  'GITHUB_CLIENT_SECRET',
  'FAKE_GITHUB_URL',
];
const NOR_THESE = ['SESSION_SECRET', 'PUBLIC_URL', 'PORT', 'HOST', 'NODE_ENV', 'LOG_LEVEL'];

/** @typedef {import('./stoppers.mjs').Stoppers} Stoppers */
/** @typedef {import('./checks.mjs').Outcome} Outcome */
/** @typedef {import('./checks.mjs').Surroundings} Surroundings */

/**
 * @param {string} root
 * @param {readonly string[]} filters parts of test files' names; none runs everything
 * @returns {Promise<number>} the exit code
 */
export async function test(root, filters) {
  const stoppers = createStoppers();
  return new Promise((resolve) => {
    const finish = (/** @type {number} */ code) => void stoppers.stopAll().then(() => resolve(code));
    for (const signal of ['SIGINT', 'SIGTERM', 'SIGHUP']) {
      process.on(signal, () => {
        if (!stoppers.isStopping) say('\nStopping.');
        finish(130);
      });
    }
    runAll(root, filters, stoppers).then(
      async (outcomes) => {
        if (stoppers.isStopping) return;
        await stoppers.stopAll();
        say(`\n${summary(outcomes)}`);
        resolve(outcomes.every(({ isFine }) => isFine) ? 0 : 1);
      },
      (error) => {
        if (!stoppers.isStopping) sayFailure(error);
        finish(1);
      },
    );
  });
}

/**
 * @param {string} root
 * @param {readonly string[]} filters
 * @param {Stoppers} stoppers
 * @returns {Promise<Outcome[]>}
 */
async function runAll(root, filters, stoppers) {
  const began = performance.now();
  const { signal } = stoppers;
  const dataDirectory = ensureDataDirectory(root);
  const directory = makeTemporaryDirectory();
  stoppers.add(() => rmSync(directory, { recursive: true, force: true, maxRetries: 5 }));
  await step(
    'packages',
    () => ensurePackages(root, signal),
    (did) => (did ? 'Packages installed.' : null),
  );
  const cluster = await step(
    'database',
    () => startThrowawayCluster({ directory }),
    () => 'Throwaway database started.',
  );
  stoppers.add(cluster.stop);

  const temporary = path.join(directory, 'tmp');
  mkdirSync(temporary, { mode: 0o711 });
  const env = {
    ...Object.fromEntries(
      Object.entries(process.env).filter(([name]) => ![...NOT_FOR_TESTS, ...NOR_THESE].includes(name)),
    ),
    TMPDIR: temporary,
    TEST_DATABASE_ADMIN_URL: cluster.adminUrl,
    TEST_DATABASE_OWNER_URL: cluster.ownerUrl,
    TEST_DATABASE_APP_URL: cluster.appUrl,
  };
  const surroundings = { root, env, directory, signal };
  const needsBrowser =
    filters.length === 0 || browserTests(root).some((file) => filters.some((one) => file.includes(one)));
  // One installer at a time: PostgreSQL's is done by now, and this one works while the checks do.
  const browser = needsBrowser
    ? setUp('browser', ensureChromium, 'Chromium installed.')
    : Promise.resolve(null);

  const outcomes =
    filters.length === 0
      ? await everything(surroundings, dataDirectory, browser)
      : await matching(surroundings, dataDirectory, needsBrowser, browser, filters);
  if (!signal.aborted) say(`All done after ${secondsSince(began)}.`);
  return outcomes;
}

/**
 * Two lanes for two cores, each taking the next part that is left, after the build the longest first. A part of the browser's and
 * the API's time is waiting, so that each has another part beside it.
 * @param {Surroundings} surroundings
 * @param {string} dataDirectory
 * @param {Promise<Outcome | null>} browser
 */
async function everything(surroundings, dataDirectory, browser) {
  const built = buildClient(surroundings, dataDirectory);
  const parts = [
    () => built,
    async () => {
      await Promise.all([built, browser]);
      return vitest('browser tests', ['--project=browser'], surroundings);
    },
    () => vitest('unit and client tests', ['--project=unit', '--project=client'], surroundings),
    async () => {
      // The tests of the start command take the client that is built.
      await built;
      return vitest('API and fault tests', ['--project=api'], surroundings);
    },
    () => check('lint', ['node_modules/eslint/bin/eslint.js', '--max-warnings=0', '.'], surroundings),
    () => check('types', ['node_modules/typescript/bin/tsc', '--noEmit'], surroundings),
    () =>
      check(
        'format',
        ['node_modules/prettier/bin/prettier.cjs', '--check', '--log-level=warn', '.'],
        surroundings,
      ),
  ];
  const lane = async () => {
    const outcomes = [];
    for (let part = parts.shift(); part !== undefined; part = parts.shift()) outcomes.push(await part());
    return outcomes;
  };
  return withoutNull((await Promise.all([lane(), lane(), browser])).flat());
}

/**
 * @param {Surroundings} surroundings
 * @param {string} dataDirectory
 * @param {boolean} needsBrowser
 * @param {Promise<Outcome | null>} browser
 * @param {readonly string[]} filters
 */
async function matching(surroundings, dataDirectory, needsBrowser, browser, filters) {
  const built = needsBrowser ? buildClient(surroundings, dataDirectory) : null;
  const ready = await Promise.all([built, browser]);
  return [
    ...withoutNull(ready),
    await vitest(`tests that match ${filters.join(' or ')}`, filters, surroundings, true),
  ];
}

/**
 * @param {Surroundings} surroundings
 * @param {string} dataDirectory
 */
function buildClient({ root, signal }, dataDirectory) {
  return setUp('client', () => ensureClient(root, dataDirectory, signal), 'Client built.');
}

/**
 * A part that some tests need: when it cannot be had, that is a failure of the run, and the other tests still run.
 * @param {string} name
 * @param {() => Promise<boolean>} work
 * @param {string} sentence said when there was something to do
 * @returns {Promise<Outcome | null>} null when all is well
 */
async function setUp(name, work, sentence) {
  const started = performance.now();
  try {
    await step(name, work, (did) => (did ? sentence : null));
    return null;
  } catch (error) {
    sayFailure(error);
    const counts = { passed: 0, failed: 1, skipped: 0 };
    return { name, isFine: false, seconds: (performance.now() - started) / 1000, counts };
  }
}

/**
 * @param {ReadonlyArray<Outcome | null>} outcomes
 * @returns {Outcome[]}
 */
function withoutNull(outcomes) {
  return outcomes.filter((one) => one !== null);
}

/**
 * @param {string} root
 * @returns {string[]}
 */
function browserTests(root) {
  try {
    return readdirSync(path.join(root, 'tests', 'browser')).map((name) => `tests/browser/${name}`);
  } catch {
    return [];
  }
}
