import AxeBuilder from '@axe-core/playwright';
import { expect, test } from '@playwright/test';
import type { Page } from '@playwright/test';
import { signIn } from './support/sign-in';

/** Some thirty pages and widths, each read through by axe. */
test.setTimeout(300_000);

async function firstLink(page: Page, prefix: string): Promise<string> {
  const href = await page.locator(`main a[href^="${prefix}"]`).first().getAttribute('href');
  if (href === null) throw new Error(`no link to ${prefix} on ${page.url()}`);
  return href;
}

/** Both widths of one page, without loading it twice: the sheet answers to its window. */
async function check(page: Page, path: string): Promise<void> {
  await page.setViewportSize({ width: 1440, height: 900 });
  await page.goto(path);
  await page.getByRole('main').waitFor();
  for (const width of [1440, 390]) {
    await page.setViewportSize({ width, height: 900 });
    // Charts draw themselves after the page has loaded, and again when their width changes.
    await page.waitForTimeout(300);
    const { violations } = await new AxeBuilder({ page }).analyze();
    expect(
      violations.map(({ id, nodes }) => ({
        id,
        at: nodes.map(({ target }) => target.join(' ')).slice(0, 3),
      })),
      `${path}, ${width} px wide`,
    ).toEqual([]);
    const overflow = await page.evaluate(() => document.documentElement.scrollWidth - window.innerWidth);
    expect(overflow, `${path} is wider than its window of ${width} px`).toBeLessThanOrEqual(0);
  }
}

for (const colorScheme of ['light', 'dark'] as const)
  test(`every page of the demonstration lab, ${colorScheme}, wide and narrow`, async ({ browser }) => {
    const context = await browser.newContext({ colorScheme, baseURL: process.env.OUTFOLD_E2E_URL });
    const page = await context.newPage();
    for (const path of ['/sign-in', '/forgotten-password', '/away']) await check(page, path);
    await signIn(page, 'lead@demo.outfold.test');
    for (const path of ['/', '/account', '/members', '/audit']) await check(page, path);
    await page.goto('/');
    const study = await firstLink(page, '/studies/');
    await check(page, study);
    const session = await firstLink(page, '/sessions/');
    await check(page, session);
    const readout = await firstLink(page, '/readouts/');
    for (const path of [
      `${session}/intake`,
      `${session}/readouts/new`,
      readout,
      '/problems/not-found',
      '/nowhere',
    ])
      await check(page, path);
    await context.close();
  });
