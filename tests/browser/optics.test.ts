import type { Browser, Page } from 'playwright-core';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { type Product, startProduct } from './support/product';
import { launchBrowser, openPage, signIn } from './support/watched-page';

let product: Product;
let browser: Browser;
beforeAll(async () => {
  product = await startProduct();
  browser = await launchBrowser({ webgl: false });
});
afterAll(async () => {
  await browser.close();
  await product.stop();
});

async function writeProtocol(page: Page, name: string, kind: 'states' | 'unitaries', bench: string) {
  await page.getByRole('link', { name: /^Plan/u }).click();
  await page.getByRole('link', { name: 'Write a protocol' }).click();
  await page.getByLabel('name', { exact: true }).fill(name);
  await page.getByRole('radio', { name: new RegExp(`^${kind}`, 'u') }).check();
  await page.getByLabel('bench', { exact: true }).selectOption({ label: bench });
  await page.getByRole('button', { name: 'Write the targets' }).click();
  await page.getByRole('combobox', { name: 'New target' }).waitFor();
}

const gateBench = 'gate bench, 810 nm, Q-A H-5 Q-D';

describe('a protocol of unitaries', () => {
  it('is written, solved for three real plates, looked at, planned, drawn and saved', async () => {
    const { page, context, faults } = await openPage(browser, product);
    await signIn(page, 'Ines Varga');
    await writeProtocol(page, 'Gates of the morning', 'unitaries', gateBench);

    await page.getByRole('combobox', { name: 'New target' }).focus();
    // Completion: two letters, the way down, Enter.
    await page.keyboard.type('rot');
    await page.getByRole('option', { name: /rotate\(axis, angle\)/u }).waitFor();
    await page.keyboard.press('ArrowDown');
    await page.keyboard.press('Enter');
    await page.keyboard.type('x, 50deg)');
    await page.keyboard.press('Enter');
    const count = page.getByRole('button', { name: /^Solution 1 of 4 for target t0$/u });
    await count.waitFor();
    for (const expression of ['T', 'qwp(10deg) hwp(70deg)', 'from D to L']) {
      await page.keyboard.type(expression);
      await page.keyboard.press('Enter');
      await page
        .getByRole('row', { selected: true })
        .getByRole('button', { name: /^Solution/u })
        .waitFor();
    }
    await page.getByRole('combobox', { name: 'New target' }).pressSequentially('matrix [[1, 1], [1, 1]]');
    await page.getByText(/not unitary/u).waitFor();
    await page.getByRole('button', { name: /^Write matrix \[\[/u }).click();
    await page
      .getByText('Row 5 can’t be read and holds this up.', { exact: true })
      .waitFor({ state: 'hidden' });

    // Where six states go, in words for whoever can't see the drawing.
    await page.getByText('T', { exact: true }).first().click();
    await page.getByRole('radio', { name: 'six states' }).check();
    await page.getByRole('button', { name: 'in words' }).click();
    expect(await page.getByRole('row', { name: /^D goes|D\b.*°/u }).count()).toBeGreaterThan(0);

    // The saving is shown before it is taken, and taking it is undone as one.
    await page.getByRole('button', { name: /^Plan the least travel/u }).click();
    await page.getByRole('button', { name: 'Try other orders too' }).click();
    await page.getByText(/^Choosing the solutions saves/u).waitFor();
    await page.getByRole('button', { name: 'Rank the list by least travel' }).click();
    await page.getByRole('button', { name: 'say where the dials stand' }).waitFor();
    await page.getByText(/saved \d\d:\d\d:\d\d/u).waitFor();

    await page.getByRole('button', { name: 'Draw the budget by Monte Carlo' }).click();
    await page.getByLabel('draws').selectOption('1000000');
    await page.getByRole('button', { name: 'Draw the budget', exact: true }).click();
    await page.getByRole('button', { name: 'Cancel the drawing' }).click();
    await page.getByLabel('draws').selectOption('10000');
    await page.getByRole('button', { name: 'Draw the budget', exact: true }).click();
    await page.getByRole('img', { name: /^Histogram of 1 − F over 10000 draws/u }).waitFor();

    await page.getByRole('button', { name: 'Save version 1' }).click();
    await page.getByLabel('message: what changed, and why').fill('Five gates for the process check');
    await page.getByRole('dialog').getByRole('button', { name: 'Save version 1' }).click();
    await page.waitForURL(/\/versions\/1$/u);
    await page.getByText('Hashed again on this page from the text of the version: it agrees.').waitFor();
    expect(faults()).toEqual([]);
    await context.close();
  });
});

describe('many rows at once', () => {
  it('come from a set or a file, bad ones named by line and column, and go again by one undo', async () => {
    const { page, context, faults } = await openPage(browser, product);
    await signIn(page, 'Tomas Reuter');
    await writeProtocol(page, 'Rows at once', 'states', gateBench);
    await page.getByRole('button', { name: /^Add a set/u }).click();
    const dialog = page.getByRole('dialog');
    await dialog.getByLabel('set', { exact: true }).selectOption('tetrahedron');
    await dialog.getByRole('button', { name: 'Add 4 rows' }).click();
    // Three plates for a state: a whole family, its best member standing.
    await page
      .getByText(/plate may stand at any of many angles here/u)
      .first()
      .waitFor();

    await page.getByRole('button', { name: /^Add a set/u }).click();
    await dialog.getByRole('radio', { name: 'text or a file' }).check();
    await dialog.getByLabel('A file of rows').setInputFiles({
      name: 'rows.csv',
      mimeType: 'text/csv',
      buffer: Buffer.from('label;expression\nT1;linear(30deg)\na2;linear(30)\na3;"=1+1"\na4;H;V\n'),
    });
    await dialog.getByText(/^Line 3\. Column 8 of the expression: 30 of what\?/u).waitFor();
    await dialog.getByText(/^2 rows can’t be read/u).waitFor();
    await dialog.getByText('One line gives no row and will not be added.').waitFor();
    await dialog.getByText('A label is taken already: T1 becomes t0.').waitFor();
    await dialog.getByRole('button', { name: 'Add 3 rows' }).click();
    await page.getByText('Rows 6, 7 can’t be read and hold this up.', { exact: true }).waitFor();
    await page.keyboard.press('Control+z');
    await page
      .getByText('Rows 6, 7 can’t be read and hold this up.', { exact: true })
      .waitFor({ state: 'hidden' });

    await page.getByRole('button', { name: /^Add a set/u }).click();
    await dialog.getByRole('radio', { name: 'text or a file' }).check();
    await dialog.getByLabel('A file of rows').setInputFiles({
      name: 'picture.csv',
      mimeType: 'text/csv',
      buffer: Buffer.from([0x89, 0x50, 0x4e, 0x47, 0, 0xff, 0xfe]),
    });
    await dialog.getByText(/can’t be read as UTF-8 text|is not text/u).waitFor();
    await page.keyboard.press('Escape');
    expect(faults()).toEqual([]);
    await context.close();
  });
});

/** Targets that are in the document, of however many there are. */
const mounted = (page: Page) => page.locator('tbody[data-row]').count();

describe('two hundred targets of three plates', () => {
  it('are solved beside the page, with those in sight in the document; keys, search and undo reach every one', async () => {
    const { page, context, faults } = await openPage(browser, product);
    await signIn(page, 'Ines Varga');
    await writeProtocol(page, 'Two hundred gates', 'unitaries', gateBench);
    await page.getByRole('button', { name: /^Add a set/u }).click();
    const dialog = page.getByRole('dialog');
    await dialog.getByRole('radio', { name: 'text or a file' }).check();
    const rows = Array.from({ length: 200 }, (_, row) => `g${row};rotate(x, ${row + 10.5}deg)`);
    await dialog.getByLabel('A file of rows').setInputFiles({
      name: 'rows.csv',
      mimeType: 'text/csv',
      buffer: Buffer.from(`label;expression\n${rows.join('\n')}\n`),
    });
    await dialog.getByRole('button', { name: 'Add 200 rows' }).click();
    await page.getByRole('button', { name: 'Solution 1 of 4 for target g0', exact: true }).waitFor();
    const mostMounted = 50;
    expect(await mounted(page)).toBeLessThan(mostMounted);
    // The head, two hundred targets, the empty row, and whatever notes stand under them.
    const table = page.getByRole('table', { name: /^Targets/u });
    expect(Number(await table.getAttribute('aria-rowcount'))).toBeGreaterThanOrEqual(202);
    // None of the solving is the page's.
    expect(page.workers().length).toBeGreaterThan(0);

    const selected = page.getByRole('row', { selected: true });
    const focused = page.locator('tr[aria-selected="true"]:focus');
    await page.getByRole('cell', { name: 'g1', exact: true }).click();
    await selected.focus();
    await page.keyboard.press('End');
    await page.getByRole('button', { name: 'Solution 1 of 4 for target g199', exact: true }).waitFor();
    expect(await selected.getByRole('cell', { name: 'g199', exact: true }).isVisible()).toBe(true);
    expect(await focused.count()).toBe(1);
    await page.keyboard.press('ArrowUp');
    await selected.getByRole('cell', { name: 'g198', exact: true }).waitFor();
    await page.keyboard.press('Alt+ArrowUp');
    expect(await selected.getByRole('cell').first().textContent()).toBe('198');

    // Scrolled out of sight, the selected row stays in the document with its focus, and so does the row to write in.
    await page.getByRole('region', { name: 'Targets' }).evaluate((region) => region.scrollTo(0, 0));
    await page.getByRole('cell', { name: 'g0', exact: true }).waitFor();
    // And it stays there, whatever is drawn anew.
    await page.waitForTimeout(500);
    expect(await page.getByRole('cell', { name: 'g0', exact: true }).isVisible()).toBe(true);
    expect(await mounted(page)).toBeLessThan(mostMounted);
    expect(await focused.count()).toBe(1);
    expect(await page.getByRole('combobox', { name: 'New target' }).count()).toBe(1);

    await page.keyboard.press('/');
    await page.keyboard.type('rotate(x, 130.5deg)');
    await page.getByText('1 of 1', { exact: true }).waitFor();
    await selected.getByRole('cell', { name: 'g120', exact: true }).waitFor();
    await page.keyboard.press('Escape');
    expect(await focused.count()).toBe(1);
    const region = await page.getByRole('region', { name: 'Targets' }).boundingBox();
    const row = await selected.boundingBox();
    expect(row?.y).toBeGreaterThanOrEqual(region?.y ?? Number.POSITIVE_INFINITY);
    expect((row?.y ?? 0) + (row?.height ?? 0)).toBeLessThanOrEqual(
      (region?.y ?? 0) + (region?.height ?? 0) + 1,
    );

    await page.keyboard.press('Delete');
    await page.getByText('Row 121, g120, taken out.').waitFor();
    await page.getByRole('button', { name: 'Undo', exact: true }).click();
    await page.keyboard.press('/');
    await page.keyboard.type('g120');
    await page.getByText('1 of 1', { exact: true }).waitFor();

    // The stage is in sight of the whole list, and nothing is wider than a phone.
    await page.keyboard.press('Escape');
    await page.keyboard.press('End');
    expect(await page.getByText('expected fidelity').isVisible()).toBe(true);
    await page.setViewportSize({ width: 390, height: 844 });
    // What is drawn as wide as its place is drawn again after the window has its new width.
    await expect
      .poll(() => page.evaluate('document.documentElement.scrollWidth'), { timeout: 10_000 })
      .toBe(390);
    expect(faults()).toEqual([]);
    await context.close();
  });
});

describe('the pages around the designer', () => {
  it('answer for a visitor: a gate’s angles as published, and one light in every convention by an address to send', async () => {
    const { page, context, faults } = await openPage(browser, product);
    await page.goto('/quick-angles?for=apply&state=T');
    await page.getByRole('radio', { name: 'be a unitary' }).waitFor();
    await page.getByText('56.25°').first().waitFor();
    await page.getByRole('radio', { name: 'measure a state' }).check();
    await page.getByText(/polariser that passes level light/u).waitFor();

    await page.goto('/conventions?state=L');
    await page.getByRole('heading', { level: 1 }).waitFor();
    await page
      .getByText(/counter-clockwise/u)
      .first()
      .waitFor();
    expect(faults()).toEqual([]);
    await context.close();
  });
});
