import type { Browser, Page } from 'playwright-core';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { type Product, startProduct } from './support/product';
import { launchBrowser, openPage, signIn } from './support/watched-page';

const protocolName = 'Five corners';
const written = [
  '(H + i V)/sqrt(2)',
  '|D>',
  'bloch(109.47deg, 120deg)',
  'ellipse(30deg, -20deg)',
  'linear(22.5deg)',
] as const;

let product: Product;
beforeAll(async () => {
  product = await startProduct();
});
afterAll(async () => {
  await product.stop();
});

/** Writes a state in the last, empty row by keys alone, and waits until its dials are there. */
async function writeTarget(page: Page, expression: string): Promise<void> {
  await page.keyboard.type(expression);
  await page.keyboard.press('Enter');
  const row = page.getByRole('row', { selected: true });
  await row.getByRole('button', { name: /^Solution/u }).waitFor();
}

/** The two dials of the row that is looked at, as they are written there. */
async function dialsOfSelected(page: Page): Promise<string[]> {
  const cells = page.getByRole('row', { selected: true }).getByRole('cell');
  const texts = await Promise.all([3, 4].map((place) => cells.nth(place).innerText()));
  return texts.map((text) => /^\d{1,3}\.\d/u.exec(text.trim())?.[0] ?? text);
}

/** A second press within this confirms nothing: a double tap must not pass a plate. */
const handsPaceMs = 400;

/** Confirms every plate of one setting, then records it. */
async function runSetting(page: Page): Promise<void> {
  const record = page.getByRole('button', { name: /^Record/u });
  const next = page.getByRole('button', { name: / says \d|^Record/u });
  for (let press = 0; press < 4; press += 1) {
    const records = await record.isVisible();
    await next.click();
    await page.waitForTimeout(handsPaceMs);
    if (records) return;
  }
  throw new Error('This setting asks for more than two plates and a record.');
}

describe.each([
  ['with WebGL', true],
  ['with WebGL switched off', false],
])('the main job, %s', (_name, webgl) => {
  let browser: Browser;
  let versionAddress = '';
  const seen = new Set<string>();

  beforeAll(async () => {
    browser = await launchBrowser({ webgl });
  });
  afterAll(async () => {
    await browser.close();
  });

  it('lets a designer write five states, see their angles and paths, and save them as a version', async () => {
    const { page, context, faults } = await openPage(browser, product);
    page.on('request', (request) => {
      const { pathname } = new URL(request.url());
      if (pathname.startsWith('/api/v1/labs/') && request.method() === 'GET') seen.add(pathname);
    });
    await signIn(page, 'Ines Varga');
    await page.getByRole('link', { name: /^Plan/u }).click();
    await page.getByRole('link', { name: 'Write a protocol' }).click();
    await page.getByLabel('name', { exact: true }).fill(protocolName);
    await page.getByLabel('bench', { exact: true }).selectOption({ label: 'signal arm, 810 nm, H-3 Q-B' });
    await page.getByRole('button', { name: 'Write the targets' }).click();

    await page.getByRole('combobox', { name: 'New target' }).focus();
    for (const expression of written) {
      await writeTarget(page, expression);
      for (const dial of await dialsOfSelected(page)) expect(dial).toMatch(/^\d{1,3}\.\d$/u);
    }
    const figure = page.getByRole('img', { name: /sphere|path|light/iu }).first();
    await figure.waitFor();
    await page.locator(`[data-renderer="${webgl ? 'webgl' : 'svg'}"]`).waitFor();

    await page
      .getByRole('combobox', { name: 'New target' })
      .pressSequentially('cos(22.5) H + sin(22.5deg) V');
    await page.getByText('Column 5: 22.5 of what? Write 22.5deg or 22.5rad.').waitFor();
    await page.getByText('Row 6 can’t be read and holds this up.', { exact: true }).waitFor();
    await page.keyboard.press('Home');
    const behindNumber = 'cos(22.5'.length;
    for (let column = 0; column < behindNumber; column += 1) await page.keyboard.press('ArrowRight');
    await page.keyboard.type('deg');
    await page.keyboard.press('Enter');
    await page.getByText(/saved \d\d:\d\d:\d\d/u).waitFor();

    await page.getByRole('button', { name: 'Save version 1' }).click();
    await page.getByLabel('message: what changed, and why').fill('The five corners of the new experiment');
    await page.getByRole('dialog').getByRole('button', { name: 'Save version 1' }).click();
    await page.waitForURL(/\/versions\/1$/u);
    await page.getByText('Hashed again on this page from the text of the version: it agrees.').waitFor();
    versionAddress = new URL(page.url()).pathname;
    expect(faults()).toEqual([]);
    await context.close();
  });

  it('lets an operator run that version on a tablet, one setting at a time, and skip one with a reason', async () => {
    const { page, context, faults } = await openPage(browser, product, { width: 1180, height: 820 });
    await signIn(page, 'Juno Petrak');
    await page.goto(versionAddress);
    await page.getByRole('link', { name: 'Run version 1' }).click();
    await page
      .getByText(/laser-safety officer/iu)
      .first()
      .waitFor();
    await page.getByRole('checkbox').check();
    await page.getByRole('button', { name: 'Start the run', exact: true }).click();
    await page.waitForURL(/\/bench\/runs\//u);
    await page.locator('html[data-theme="dark-room"]').waitFor();

    await runSetting(page);
    // Leaving a run asks once.
    page.once('dialog', (dialog) => void dialog.accept());
    await page.reload();
    await runSetting(page);
    await page.getByRole('button', { name: 'Note trouble' }).click();
    await page.getByLabel('what is in the way').fill('shutter stuck');
    await page.getByRole('button', { name: /^Skip/u }).click();
    for (let setting = 4; setting <= written.length + 1; setting += 1) await runSetting(page);
    await page.getByRole('button', { name: /^Finish/u }).click();
    await page.getByRole('cell', { name: /shutter stuck/u }).waitFor();
    expect(faults()).toEqual([]);
    await context.close();
  });

  it('refuses every address of the first lab to somebody of the other', async () => {
    const { page, context } = await openPage(browser, product);
    await signIn(page, 'Oskar Lindqvist');
    expect(seen.size).toBeGreaterThan(3);
    for (const address of seen) {
      const answer = await page.request.get(address);
      expect([address, answer.status()]).toEqual([address, 404]);
    }
    for (const address of [versionAddress, versionAddress.replace(/\/plan.*/u, '')]) {
      await page.goto(address);
      await page.getByText('There is no such page').waitFor();
      expect(await page.getByText(protocolName).count()).toBe(0);
    }
    await context.close();
  });
});
