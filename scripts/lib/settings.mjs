import { randomBytes } from 'node:crypto';
import { chmodSync, existsSync, mkdirSync, readFileSync, writeFileSync } from 'node:fs';
import path from 'node:path';
import util from 'node:util';
import { Failure } from './say.mjs';

/** @typedef {Record<string, string | undefined>} Environment */

/**
 * The settings in force: the environment's own, then those of the file .env; an empty value counts as not set.
 * @param {string} root
 * @param {Environment} [environment]
 * @returns {Environment}
 */
export function readSettings(root, environment = process.env) {
  const file = path.join(root, '.env');
  const fromFile = existsSync(file) ? util.parseEnv(readFileSync(file, 'utf8')) : {};
  /** @type {Environment} */
  const settings = { ...fromFile };
  for (const [name, value] of Object.entries(environment))
    if (value !== undefined && value !== '') settings[name] = value;
  for (const name of Object.keys(settings)) if (settings[name] === '') delete settings[name];
  return settings;
}

/**
 * The clone's folder for what it keeps. Passable for the database's user, since the cluster may be inside; each secret in it has its own lock.
 * @param {string} root
 */
export function ensureDataDirectory(root) {
  const directory = path.join(root, '.data');
  try {
    mkdirSync(directory, { recursive: true });
    chmodSync(directory, 0o711);
  } catch {
    throw new Failure(
      `The folder ${directory} cannot be written to: perhaps another user, such as root, started here before.`,
      `Start as that user, or give the folder to yourself: sudo chown -R "$(id -un)" '${directory}'`,
    );
  }
  return directory;
}

/**
 * A value kept in a file that only its owner reads, made at the first call.
 * @param {string} file
 * @param {() => string} make
 */
export function keepSecret(file, make) {
  if (existsSync(file)) return readFileSync(file, 'utf8');
  const value = make();
  writeFileSync(file, value, { mode: 0o600, flag: 'wx' });
  return value;
}

/** 256 random bits as text. */
export function randomSecret() {
  return randomBytes(32).toString('hex');
}

/**
 * A port that was asked for by name. Undefined when none was.
 * @param {string | undefined} text
 * @param {string} name
 */
export function readPort(text, name) {
  if (text === undefined) return undefined;
  const port = Number(text);
  if (!/^\d{1,5}$/.test(text) || port < 1 || port > 65535) {
    throw new Failure(
      `${name} is "${text}", which is no port.`,
      `Set ${name} to a number from 1 to 65535, or leave it out.`,
    );
  }
  return port;
}
