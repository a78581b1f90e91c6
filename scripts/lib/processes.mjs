/**
 * Questions about processes that are not our children, answered from Linux's /proc.
 */
import { readFileSync, readdirSync, readlinkSync } from 'node:fs';
import { setTimeout as sleep } from 'node:timers/promises';

/**
 * When a process started, in the kernel's ticks; tells a process from a later one that was given the same id. Null when there is none.
 * @param {number} pid
 * @returns {string | null}
 */
export function startTimeOf(pid) {
  try {
    const stat = readFileSync(`/proc/${pid}/stat`, 'utf8');
    // The second field is the program's name in brackets and may hold spaces; count from behind it.
    const fields = stat.slice(stat.lastIndexOf(')') + 2).split(' ');
    const state = fields[0];
    return state === 'Z' || state === 'X' ? null : (fields[19] ?? null);
  } catch {
    return null;
  }
}

/**
 * The processes whose working directory is `directory`; those that we may not look at are left out.
 * @param {string} directory
 * @returns {number[]}
 */
export function processesIn(directory) {
  return readdirSync('/proc')
    .filter((name) => /^\d+$/.test(name))
    .map(Number)
    .filter((pid) => {
      try {
        return readlinkSync(`/proc/${pid}/cwd`) === directory;
      } catch {
        return false;
      }
    });
}

/**
 * Waits until `condition` holds; false when `limitMs` passed first.
 * @param {() => boolean | Promise<boolean>} condition
 * @param {number} limitMs
 * @param {number} [everyMs]
 */
export async function waitUntil(condition, limitMs, everyMs = 25) {
  const deadline = Date.now() + limitMs;
  for (;;) {
    if (await condition()) return true;
    if (Date.now() > deadline) return false;
    await sleep(everyMs);
  }
}
