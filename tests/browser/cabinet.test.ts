import { randomUUID } from 'node:crypto';
import type { Browser, Page } from 'playwright-core';
import { afterAll, beforeAll, expect, it } from 'vitest';
import { type Product, startProduct } from './support/product';
import { launchBrowser, openPage, signIn } from './support/watched-page';

/*
 * One plate's life at the lab: unknown, scanned, settled, relied on, seated anew, stale, and solved for again. The scans are
 * made from the model of optics.md, 6, of a plate of 87.2° whose fast axis reads 40.3.
 */

const RETARDANCE_DEG = 87.2;

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

const sin2 = (angleDeg: number): number => Math.sin((angleDeg * Math.PI) / 180) ** 2;

/** Powers behind both ports of crossed polarisers, in µW, with a scatter that is the same each time. */
function scanFile(zeroDeg: number): string {
  const rows = Array.from({ length: 37 }, (_, k) => {
    const dialDeg = 5 * k;
    const share = 1e-4 + (1 - 2e-4) * sin2(RETARDANCE_DEG / 2) * sin2(2 * (dialDeg - zeroDeg));
    const scatter = (seed: number) => 1.5 * Math.sin(12.9898 * k + seed);
    return [
      dialDeg,
      (2000 * share + scatter(1)).toFixed(3),
      (2000 * (1 - share) + scatter(2)).toFixed(3),
    ].join(';');
  });
  return ['# bench log', 'dial (deg);crossed (uW);parallel (uW)', ...rows, ''].join('\n');
}

function labOf(page: Page): string {
  return /\/labs\/([^/]+)/u.exec(page.url())?.[1] ?? '';
}

/** Reads a scan in, looks at what it tells, and records it. */
async function scan(page: Page, zeroDeg: number): Promise<void> {
  await page.getByLabel(/^the scan’s file/u).setInputFiles({
    name: 'q-x.csv',
    mimeType: 'text/csv',
    buffer: Buffer.from(scanFile(zeroDeg)),
  });
  await page.getByLabel('wavelength, nm', { exact: true }).fill('810');
  await page.getByRole('img', { name: /Q-X/u }).first().waitFor();
  await page.getByRole('button', { name: 'Record this calibration' }).click();
  await page.waitForURL((url) => !url.pathname.endsWith('/scan'));
}

/** What is below the scan's plot stands where it stays, also while the file is on its way: a press meets what it was meant for. */
async function expectNoJump(page: Page): Promise<void> {
  const file = /\/files\//u;
  const link = page.getByRole('link', { name: 'record what the mark on its rim says' });
  const topOf = async () => Math.round((await link.boundingBox())?.y ?? NaN);
  const desk = page.viewportSize() ?? { width: 1440, height: 900 };
  for (const width of [390, 800, 1180, 1290, desk.width]) {
    let release = (): void => undefined;
    const isReleased = new Promise<void>((resolve) => {
      release = resolve;
    });
    await page.route(file, async (route) => {
      await isReleased;
      await route.continue();
    });
    await page.setViewportSize({ ...desk, width });
    await page.reload();
    await page.getByText('Drawing the scan').waitFor();
    const before = await topOf();
    release();
    await page.getByRole('img', { name: /^Scan of Q-X/u }).waitFor();
    expect([width, await topOf()]).toEqual([width, before]);
    await page.unroute(file);
  }
}

/** A person says that the mark on the rim is the fast axis. */
async function settle(page: Page): Promise<void> {
  await page.getByRole('link', { name: 'record what the mark on its rim says' }).click();
  const dialog = page.getByRole('dialog');
  await dialog.getByRole('radio').first().check();
  await dialog.getByLabel('how it is known').fill('The mark on its rim is the fast axis');
  await dialog.getByRole('button', { name: 'Settle it' }).click();
  await dialog.waitFor({ state: 'detached' });
}

/** The dial of Q-X in the designer's selected row. */
async function dialOf(page: Page): Promise<string> {
  const row = page.getByRole('row', { selected: true });
  await row.getByRole('button', { name: /^Solution/u }).waitFor();
  return row.getByRole('cell').nth(3).innerText();
}

it('takes a plate from unknown to calibrated, seats it anew, shows what went stale, and makes the new draft', async () => {
  const { page, context, faults } = await openPage(browser, product);
  await signIn(page, 'Ines Varga');
  const labId = labOf(page);

  // Unknown: it comes into the cabinet in a mount, and nothing was measured of it.
  await page.goto(`/labs/${labId}/cabinet?do=add`);
  await page.getByLabel(/^plate’s name/u).fill('Q-X');
  await page.getByLabel('kind', { exact: true }).selectOption('quarter');
  await page.getByLabel('made for, nm').fill('810');
  await page.getByLabel(/^mount’s name/u).fill('M-X');
  await page.getByLabel('finest step of its engraving, degrees').fill('0.1');
  await page.getByLabel('repeats within (σ), degrees').fill('0.05');
  await page.getByRole('button', { name: 'Add the plate' }).click();
  await page.getByRole('heading', { name: 'Q-X has no zero yet' }).waitFor();
  const plateId = /\/cabinet\/([^/?]+)/u.exec(page.url())?.[1] ?? '';

  // Scanned: the zero and the retardance are there, and which axis is the fast one is not.
  await page.getByRole('link', { name: 'Scan between polarisers' }).first().click();
  await scan(page, 40.3);
  await page.getByRole('heading', { name: /^Fast or slow\?/u }).waitFor();
  await page
    .getByText(/^40\.[23]\d*\(/u)
    .first()
    .waitFor();
  await settle(page);
  await page.getByRole('heading', { name: /^Fast or slow\?/u }).waitFor({ state: 'detached' });

  // Relied on: a bench, a protocol and its version, all with this plate's zero.
  const bench = await page.request.post(`/api/v1/labs/${labId}/benches`, {
    headers: { Origin: product.url, 'Idempotency-Key': randomUUID() },
    data: {
      name: 'one-plate bench',
      wavelengthNm: 810,
      wavelengthSigmaNm: 0,
      temperatureC: null,
      temperatureSigmaK: 0,
      inputExpression: 'H',
      polariserSigmaDeg: 0.05,
      polariserExtinction: null,
      laserClass: '3B',
      hazardWavelengthsNm: [810],
      plateIds: [plateId],
      analysisPlateIds: [],
      detectors: { passed: null, rejected: null, efficiencyRatio: null },
    },
  });
  expect(bench.status(), await bench.text()).toBe(201);
  await page.goto(`/labs/${labId}/plan/new`);
  await page.getByLabel('name', { exact: true }).fill('Left and right of one plate');
  await page.getByLabel('bench', { exact: true }).selectOption({ label: 'one-plate bench, 810 nm, Q-X' });
  await page.getByRole('button', { name: 'Write the targets' }).click();
  await page.getByRole('combobox', { name: 'New target' }).focus();
  await page.keyboard.type('ellipse(12deg, 12deg)');
  await page.keyboard.press('Enter');
  const firstDial = await dialOf(page);
  await page.getByText(/saved \d\d:\d\d:\d\d/u).waitFor();
  await page.getByRole('button', { name: 'Save version 1' }).click();
  await page.getByLabel('message: what changed, and why').fill('With the first seat of Q-X');
  await page.getByRole('dialog').getByRole('button', { name: 'Save version 1' }).click();
  await page.waitForURL(/\/versions\/1$/u);

  // Seated anew: the zero is void, and so is every dial that was solved with it.
  await page.goto(`/labs/${labId}/cabinet/${plateId}`);
  await page.getByRole('link', { name: 'Seat it anew in M-X' }).click();
  const dialog = page.getByRole('dialog');
  await dialog.getByLabel(/^why Q-X is taken out/u).fill('Its ring worked loose.');
  await dialog.getByRole('button', { name: 'Seat Q-X anew in M-X' }).click();
  await page.getByRole('heading', { name: 'Q-X’s zero is void since the new seat' }).waitFor();
  await page.getByRole('link', { name: 'Scan between polarisers' }).first().click();
  await scan(page, 61.8);
  await expectNoJump(page);
  await settle(page);

  // Stale: the version says so by itself, and a run of it would have to be insisted on.
  const reliant = page.getByRole('list', { name: 'Versions that rely on Q-X' });
  await reliant.getByText(/void/iu).first().waitFor({ timeout: 60_000 });
  await reliant.getByRole('button', { name: 'Re-solve in a draft' }).click();

  // Solved for again: the designer stands on the draft, with dials of the new seat.
  await page.waitForURL(/\/plan\/[^/]+$/u);
  const newDial = await dialOf(page);
  expect(newDial).not.toBe(firstDial);
  await page.getByRole('button', { name: 'Save version 2' }).click();
  await page.getByLabel('message: what changed, and why').fill('With the second seat of Q-X');
  await page.getByRole('dialog').getByRole('button', { name: 'Save version 2' }).click();
  await page.waitForURL(/\/versions\/2$/u);
  expect(faults()).toEqual([]);
  await context.close();
}, 240_000);
