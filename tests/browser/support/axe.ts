import axe from 'axe-core';
import type { Page } from 'playwright-core';
import { z } from 'zod';
import { measureUndecided } from './undecided-contrast';

const tags = ['wcag2a', 'wcag2aa', 'wcag21a', 'wcag21aa', 'wcag22aa', 'best-practice'];
const leastContrast = 4.5;

const nodesSchema = z.array(
  z.object({ id: z.string(), nodes: z.array(z.object({ target: z.array(z.unknown()), html: z.string() })) }),
);
const resultSchema = z.object({ violations: nodesSchema, incomplete: nodesSchema });

/**
 * What axe-core has against the page as it stands, or against its contrast alone: its violations, and every text whose contrast it leaves undecided and that does
 * not reach 4.5:1 when it is measured on each ground of its theme. Empty when there is nothing.
 */
export async function axeFindings(page: Page, what: 'all' | 'contrast' = 'all'): Promise<string[]> {
  const runOnly =
    what === 'all' ? { type: 'tag', values: tags } : { type: 'rule', values: ['color-contrast'] };
  // By the debugger's evaluation: the content security policy of the page forbids a script of another origin, and that is right.
  await page.evaluate(axe.source);
  const result = resultSchema.parse(
    await page.evaluate(`axe.run(document, { runOnly: ${JSON.stringify(runOnly)} })`),
  );
  const violations = result.violations.flatMap(({ id, nodes }) =>
    nodes.map(({ html }) => `${id}: ${html.slice(0, 160)}`),
  );
  const undecided = result.incomplete
    .filter(({ id }) => id === 'color-contrast')
    .flatMap(({ nodes }) => nodes.map(({ target }) => target.join(' ')));
  const measured = await page.evaluate(measureUndecided, undecided);
  const faint = measured.filter(({ ratio }) => ratio < leastContrast);
  return [...violations, ...faint.map(({ selector, ratio }) => `contrast ${ratio.toFixed(2)}: ${selector}`)];
}
