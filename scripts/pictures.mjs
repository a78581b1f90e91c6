// Takes the pictures of README.md from the running product: `npm start` first, then `node scripts/pictures.mjs`.
import { mkdir, readFile } from 'node:fs/promises';
import path from 'node:path';
import { chromium } from 'playwright-core';
import { findChromium } from './lib/chromium.mjs';

const root = path.resolve(import.meta.dirname, '..');
const folder = path.join(root, 'docs/pictures');

/**
 * @param {import('playwright-core').Page} page
 * @param {string} name
 */
async function signIn(page, name) {
  await page.goto('/sign-in');
  await page.getByRole('link', { name: 'Sign in with GitHub' }).click();
  await page.getByRole('button', { name }).click();
  await page.waitForURL(/\/labs\//u);
  return new URL(page.url()).pathname;
}

/**
 * @param {import('playwright-core').Page} page
 * @param {string} name
 */
async function take(page, name) {
  await page.waitForLoadState('networkidle');
  await page.evaluate('document.fonts.ready.then(() => null)');
  await page.screenshot({ path: path.join(folder, `${name}.png`) });
}

const running = JSON.parse(await readFile(path.join(root, '.data/running.json'), 'utf8'));
await mkdir(folder, { recursive: true });
const browser = await chromium.launch({
  executablePath: findChromium() ?? '/usr/bin/chromium',
  args: ['--no-sandbox', '--disable-gpu', '--disable-3d-apis'],
});
try {
  const desk = await browser.newPage({
    baseURL: running.url,
    viewport: { width: 1440, height: 900 },
    colorScheme: 'light',
    reducedMotion: 'reduce',
  });
  await desk.goto('/sign-in');
  await take(desk, 'sign-in');
  const home = await signIn(desk, 'Ines Varga');
  await take(desk, 'home');
  await desk.goto(`${home}/plan`);
  await desk.getByRole('link', { name: /^Tetrahedron/u }).click();
  await desk.getByRole('cell', { name: 't2', exact: true }).click();
  await desk.getByText('expected fidelity').waitFor();
  await take(desk, 'designer');
  await desk.goto(`${home}/plan`);
  await desk.getByRole('link', { name: /^Gates/u }).click();
  await desk.getByRole('radio', { name: 'six states' }).check();
  await desk.getByText('expected fidelity').waitFor();
  await take(desk, 'unitaries');
  await desk.goto('/conventions?state=L');
  await take(desk, 'conventions');
  await desk.goto(`${home}/cabinet`);
  await desk.getByRole('link', { name: /^Q-B/u }).click();
  await take(desk, 'cabinet');
  await desk.goto(`${home}/review`);
  await desk
    .getByRole('link', { name: /new zero/u })
    .first()
    .click();
  await take(desk, 'version');

  const tablet = await browser.newPage({
    baseURL: running.url,
    viewport: { width: 1180, height: 820 },
    colorScheme: 'light',
    reducedMotion: 'reduce',
  });
  const bench = await signIn(tablet, 'Juno Petrak');
  await tablet.goto(`${bench}/bench`);
  await tablet.getByRole('link', { name: /^Go on/u }).click();
  await tablet.getByRole('button', { name: /resume|go on/iu }).click();
  await tablet.getByRole('button', { name: / says \d/u }).waitFor();
  await take(tablet, 'bench');
} finally {
  await browser.close();
}
