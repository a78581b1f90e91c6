import { gzipSync } from 'node:zlib';
import type { Browser, Page } from 'playwright-core';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { axeFindings } from './support/axe';
import { type Product, startProduct } from './support/product';
import { launchBrowser, openPage, signIn, type WatchedPage } from './support/watched-page';

const firstRouteLimitBytes = 170_000;
const sphereLimitBytes = 260_000;

const sizes = {
  desk: { width: 1440, height: 900 },
  tablet: { width: 1180, height: 820 },
  phone: { width: 390, height: 844 },
} as const;

let product: Product;
let browser: Browser;
let addresses: Record<string, string>;

beforeAll(async () => {
  product = await startProduct();
  browser = await launchBrowser({ webgl: false });
  addresses = await findAddresses();
});
afterAll(async () => {
  await browser.close();
  await product.stop();
});

/** The addresses of the pages of issue and picture, found as a person finds them. */
async function findAddresses(): Promise<Record<string, string>> {
  const { page, context } = await openPage(browser, product);
  await signIn(page, 'Adaeze Holm');
  const home = new URL(page.url()).pathname;
  const hrefOf = async (name: RegExp) => {
    const href = await page.getByRole('link', { name }).first().getAttribute('href');
    if (href === null) throw new Error(`No link ${String(name)} on ${page.url()}`);
    return href;
  };
  await page.goto(`${home}/plan`);
  const designer = await hrefOf(/^Tetrahedron/u);
  const gates = await hrefOf(/^Gates/u);
  await page.goto(`${home}/review`);
  const version = await hrefOf(/new zero/u);
  await page.goto(`${home}/bench`);
  const record = await hrefOf(/See the record/u);
  const run = await hrefOf(/^Go on/u);
  const edited = await hrefOf(/^Edit /u);
  await page.goto(`${home}/cabinet`);
  const plate = await hrefOf(/^H-3/u);
  await page.goto(`${home}/cabinet/mounts`);
  const mount = await hrefOf(/^M01/u);
  await context.close();
  return {
    home,
    plan: `${home}/plan`,
    'new protocol': `${home}/plan/new`,
    designer,
    'versions of a protocol': `${designer}/versions`,
    version,
    versions: `${home}/review`,
    benches: `${home}/bench`,
    'new bench': `${home}/bench/new`,
    'a bench changed': edited,
    'run start': `${home}/bench/start`,
    results: `${home}/results`,
    record,
    cabinet: `${home}/cabinet`,
    plate,
    'a scan of a plate': `${plate}/scan`,
    mounts: `${home}/cabinet/mounts`,
    mount,
    'in and out': `${home}/cabinet/exchange`,
    lab: `${home}/lab`,
    'robust designs': `${home}/plan/robust`,
    gates,
    'quick angles': '/quick-angles',
    conventions: '/conventions',
    numbers: '/how-numbers-are-made',
    privacy: '/privacy',
    parts: '/developer/parts',
    run,
  };
}

/** Waits until a page has said what it has to say: its head is there, and nothing is fetched any more. */
async function settle(page: Page): Promise<void> {
  await page.getByRole('heading', { level: 1 }).first().waitFor();
  await page.waitForLoadState('networkidle');
}

/** With `alsoInTheEvening` each page's colours are looked at once more, in the evening's theme. */
async function findingsOn(
  watched: WatchedPage,
  names: readonly string[],
  alsoInTheEvening = false,
): Promise<string[]> {
  const { page } = watched;
  const findings: string[] = [];
  for (const name of names) {
    await page.goto(addresses[name] ?? name);
    await settle(page);
    findings.push(...(await axeFindings(page)).map((finding) => `${name}: ${finding}`));
    const overflow = await page.evaluate(
      'document.documentElement.scrollWidth - document.documentElement.clientWidth',
    );
    if (overflow !== 0) findings.push(`${name}: ${String(overflow)} px wider than the window`);
    if (!alsoInTheEvening) continue;
    await page.emulateMedia({ colorScheme: 'dark' });
    await page.locator('html[data-theme="evening"]').waitFor();
    findings.push(...(await axeFindings(page, 'contrast')).map((finding) => `${name}, evening: ${finding}`));
    await page.emulateMedia({ colorScheme: 'light' });
    await page.locator('html[data-theme="day"]').waitFor();
  }
  return [...findings, ...watched.faults()];
}

const pagesOfALab = [
  'home',
  'plan',
  'new protocol',
  'designer',
  'versions of a protocol',
  'version',
  'versions',
  'benches',
  'new bench',
  'a bench changed',
  'run start',
  'results',
  'cabinet',
  'plate',
  'a scan of a plate',
  'mounts',
  'mount',
  'in and out',
  'lab',
  'robust designs',
  'gates',
  'quick angles',
  'conventions',
  'numbers',
  'privacy',
  'parts',
];

/** Those whose layout on a tablet is neither the desk's nor the phone's. */
const pagesOfATablet = [
  'home',
  'designer',
  'gates',
  'version',
  'benches',
  'new bench',
  'run start',
  'cabinet',
  'plate',
  'a scan of a plate',
  'robust designs',
  'conventions',
];

/** Some forty pages, each looked at whole; other parts of the tests share the cores. */
const sweepMs = 300_000;

describe.each([
  ['at a desk, by day and in the evening', 'desk'],
  ['on a tablet', 'tablet'],
  ['on a phone', 'phone'],
] as const)('every page, %s', (_name, size) => {
  it(
    'has nothing that axe finds or leaves undecided, and is no wider than its window',
    async () => {
      const pages = size === 'tablet' ? pagesOfATablet : pagesOfALab;
      // Two windows for two cores.
      const lanes = [0, 1].map(async (lane) => {
        const watched = await openPage(browser, product, sizes[size]);
        await signIn(watched.page, 'Adaeze Holm');
        const findings = await findingsOn(
          watched,
          pages.filter((_, place) => place % 2 === lane),
          size === 'desk',
        );
        await watched.context.close();
        return findings;
      });
      expect((await Promise.all(lanes)).flat()).toEqual([]);
    },
    sweepMs,
  );
});

describe.each([
  ['a tablet lying down', { width: 1180, height: 820 }],
  ['a tablet standing up', { width: 820, height: 1180 }],
])('the bench in the dark room, on %s', (_name, viewport) => {
  it('has nothing that axe finds or leaves undecided', async () => {
    const watched = await openPage(browser, product, viewport);
    await signIn(watched.page, 'Juno Petrak');
    expect(await findingsOn(watched, ['run', 'record'])).toEqual([]);
    await watched.context.close();
  });
});

describe('the first page', () => {
  it('fetches at most 170 kB of compressed script, nothing of the sphere, and nothing from elsewhere', async () => {
    const { page, context, faults } = await openPage(browser, product);
    const scripts = new Map<string, number>();
    page.on('response', (response) => {
      if (!response.url().endsWith('.js')) return;
      void response.body().then((body) => scripts.set(response.url(), gzipSync(body).length));
    });
    await page.goto('/sign-in');
    await settle(page);
    const total = [...scripts.values()].reduce((sum, bytes) => sum + bytes, 0);
    expect(scripts.size).toBeGreaterThan(0);
    expect(total).toBeLessThanOrEqual(firstRouteLimitBytes);
    expect([...scripts.keys()].filter((url) => url.includes('Sphere'))).toEqual([]);
    expect(await axeFindings(page)).toEqual([]);
    expect(faults()).toEqual([]);
    await context.close();
  });

  it('leaves the sphere to the pages that show one, in a script of at most 260 kB compressed', async () => {
    const withWebGl = await launchBrowser({ webgl: true });
    const { page } = await openPage(withWebGl, product);
    await signIn(page, 'Adaeze Holm');
    const sphere = page.waitForResponse(/SphereThree.*\.js$/u);
    await page.goto(addresses['designer'] ?? '');
    const body = await (await sphere).body();
    expect(gzipSync(body).length).toBeLessThanOrEqual(sphereLimitBytes);
    await withWebGl.close();
  });
});
