import { type Browser, type BrowserContext, chromium, type Page } from 'playwright-core';
import type { Product } from './product';

const flags = [
  '--no-sandbox',
  '--disable-gpu',
  '--disable-quic',
  '--no-first-run',
  '--disable-background-networking',
  '--disable-component-update',
  '--disable-sync',
];

/** three.js warns of its own coming change at every start, and software GL of being slow: neither is ours to mend. */
const expectedNoise = [/THREE\.Clock: This module has been deprecated/u, /GL Driver Message/u];

const stepLimitMs = 20_000;

export function launchBrowser({ webgl }: { webgl: boolean }): Promise<Browser> {
  return chromium.launch({
    executablePath: '/usr/bin/chromium',
    args: webgl ? [...flags, '--enable-unsafe-swiftshader'] : [...flags, '--disable-3d-apis'],
  });
}

/** A page that notes whatever must not happen anywhere: console errors, violations of the policy, requests to another origin. */
export interface WatchedPage {
  readonly page: Page;
  readonly context: BrowserContext;
  readonly faults: () => readonly string[];
}

export async function openPage(
  browser: Browser,
  product: Product,
  viewport = { width: 1440, height: 900 },
): Promise<WatchedPage> {
  const context = await browser.newContext({
    viewport,
    colorScheme: 'light',
    baseURL: product.url,
    reducedMotion: 'reduce',
  });
  const faults: string[] = [];
  await context.exposeBinding('reportViolation', (_source, text: string) => {
    faults.push(`policy: ${text}`);
  });
  await context.addInitScript(`document.addEventListener('securitypolicyviolation', (event) => {
    window.reportViolation(event.violatedDirective + ' ' + event.blockedURI + ' ' + event.sourceFile);
  });`);
  context.setDefaultTimeout(stepLimitMs);
  const page = await context.newPage();
  page.on('console', (message) => {
    const text = message.text();
    const isRefusal = text.startsWith('Failed to load resource');
    if (
      !['error', 'warning'].includes(message.type()) ||
      isRefusal ||
      expectedNoise.some((noise) => noise.test(text))
    )
      return;
    faults.push(`console: ${text}`);
  });
  page.on('pageerror', (error) => faults.push(`error: ${error.message}`));
  page.on('request', (request) => {
    const { origin, protocol } = new URL(request.url());
    if (!/^https?:$/u.test(protocol)) return;
    if (origin !== product.url && origin !== product.fakeGitHubUrl)
      faults.push(`other origin: ${request.url()}`);
  });
  return { page, context, faults: () => faults };
}

/** Signs in as one of the demo people, as they would: by the button and the provider's page. */
export async function signIn(page: Page, name: string): Promise<void> {
  await page.goto('/sign-in');
  await page.getByRole('link', { name: 'Sign in with GitHub' }).click();
  await page.getByRole('button', { name }).or(page.getByRole('link', { name })).first().click();
  await page.waitForURL(/\/(?:labs|welcome)/u);
}
