import { existsSync } from 'node:fs';
import { installDebianPackages } from './debian.mjs';

const PLACES = ['/usr/bin/chromium', '/usr/bin/chromium-browser', '/usr/bin/google-chrome'];

/** The browser that tests drive; null when the machine has none. @returns {string | null} */
export function findChromium() {
  return PLACES.find((place) => existsSync(place)) ?? null;
}

/**
 * Installs Debian's Chromium when there is none.
 * @returns {Promise<boolean>} whether it was installed
 */
export async function ensureChromium() {
  if (findChromium() !== null) return false;
  await installDebianPackages(['chromium'], 'Chromium, which the browser tests drive,');
  return true;
}
