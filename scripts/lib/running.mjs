import { readFileSync, renameSync, rmSync, writeFileSync } from 'node:fs';
import { startTimeOf } from './processes.mjs';

/**
 * @typedef {object} Running what .data/running.json says about the start that holds this clone
 * @property {number} pid
 * @property {string | null} startTime tells the process from a later one with the same number
 * @property {string | null} url null until it is ready
 */

/**
 * Takes the clone for this process, or answers who has it.
 * @param {string} file
 * @returns {Running | null} null when it is ours now
 */
export function claim(file) {
  const mine = JSON.stringify({ pid: process.pid, startTime: startTimeOf(process.pid), url: null });
  for (;;) {
    try {
      writeFileSync(file, mine, { flag: 'wx' });
      return null;
    } catch (error) {
      if (!(error instanceof Error && 'code' in error && error.code === 'EEXIST')) throw error;
    }
    const holder = read(file);
    if (holder !== null && holder.startTime !== null && startTimeOf(holder.pid) === holder.startTime)
      return holder;
    // Left by a start that was killed.
    rmSync(file, { force: true });
  }
}

/**
 * @param {string} file
 * @param {string} url
 */
export function announce(file, url) {
  writeFileSync(
    `${file}.new`,
    JSON.stringify({ pid: process.pid, startTime: startTimeOf(process.pid), url }),
  );
  renameSync(`${file}.new`, file);
}

/**
 * @param {string} file
 * @returns {Running | null}
 */
function read(file) {
  try {
    const { pid, startTime, url } = JSON.parse(readFileSync(file, 'utf8'));
    return { pid: Number(pid), startTime: startTime ?? null, url: url ?? null };
  } catch {
    return null;
  }
}
