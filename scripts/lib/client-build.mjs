import { createHash } from 'node:crypto';
import { existsSync, readFileSync, readdirSync, statSync, writeFileSync } from 'node:fs';
import path from 'node:path';
import util from 'node:util';
import { run, tail } from './run.mjs';
import { Failure } from './say.mjs';

/** Everything that the built client is made from. */
const SOURCES = [
  'src',
  'shared',
  'public',
  'index.html',
  'vite.config.ts',
  'tailwind.config.ts',
  'tsconfig.json',
  'package-lock.json',
];

/**
 * Builds the client into dist/ unless what is there was built from these very sources.
 * @param {string} root
 * @param {string} dataDirectory
 * @param {AbortSignal} signal
 * @returns {Promise<boolean>} whether it was built
 */
export async function ensureClient(root, dataDirectory, signal) {
  const hash = createHash('sha256');
  for (const source of SOURCES) addToHash(hash, root, source);
  const sources = hash.digest('hex');
  const record = path.join(dataDirectory, 'client-sources');
  const isBuilt = existsSync(path.join(root, 'dist', 'index.html')) && existsSync(record);
  if (isBuilt && readFileSync(record, 'utf8') === sources) return false;
  const built = await run(process.execPath, ['node_modules/vite/bin/vite.js', 'build'], {
    cwd: root,
    signal,
    env: { ...process.env, NODE_ENV: 'production' },
  });
  if (built.code !== 0) {
    throw new Failure(
      `The client could not be built:\n${tail(readable(built.output), 40)}`,
      'To see it all: npm run build',
    );
  }
  writeFileSync(record, sources);
  return true;
}

/**
 * @param {import('node:crypto').Hash} hash
 * @param {string} root
 * @param {string} relative
 */
function addToHash(hash, root, relative) {
  const full = path.join(root, relative);
  if (!existsSync(full)) return;
  if (statSync(full).isDirectory()) {
    for (const name of readdirSync(full).sort()) addToHash(hash, root, path.join(relative, name));
  } else {
    const content = readFileSync(full);
    hash.update(`${relative}\0${content.length}\0`).update(content);
  }
}

/**
 * Without colours, which the builder writes even when nobody can see them, and without its own stack, which tells nothing about our sources.
 * @param {string} output
 */
function readable(output) {
  return util
    .stripVTControlCharacters(output)
    .split('\n')
    .filter((line) => !/^ +at /.test(line))
    .join('\n');
}
