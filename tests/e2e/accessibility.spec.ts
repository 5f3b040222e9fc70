import AxeBuilder from '@axe-core/playwright';
import { expect, test } from '@playwright/test';
import type { Page } from '@playwright/test';
import { signIn } from './support/sign-in';

async function firstLink(page: Page, prefix: string): Promise<string> {
  const href = await page.locator(`main a[href^="${prefix}"]`).first().getAttribute('href');
  if (href === null) throw new Error(`no link to ${prefix} on ${page.url()}`);
  return href;
}

async function check(page: Page, path: string): Promise<void> {
  await page.goto(path);
  await page.getByRole('main').waitFor();
  // Charts draw themselves after the page has loaded.
  await page.waitForTimeout(400);
  const { violations } = await new AxeBuilder({ page }).analyze();
  expect(
    violations.map(({ id, nodes }) => ({ id, at: nodes.map(({ target }) => target.join(' ')).slice(0, 3) })),
    `${path} in ${JSON.stringify(page.viewportSize())}`,
  ).toEqual([]);
  const overflow = await page.evaluate(() => document.documentElement.scrollWidth - window.innerWidth);
  expect(overflow, `${path} is wider than its window`).toBeLessThanOrEqual(0);
}

for (const colorScheme of ['light', 'dark'] as const)
  for (const width of [1440, 390])
    test(`every page of the demonstration lab, ${colorScheme}, ${width} px wide`, async ({ browser }) => {
      const context = await browser.newContext({
        colorScheme,
        viewport: { width, height: 900 },
        baseURL: process.env.OUTFOLD_E2E_URL,
      });
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
      await check(page, `${session}/intake`);
      await check(page, `${session}/readouts/new`);
      await check(page, readout);
      await check(page, '/problems/not-found');
      await check(page, '/nowhere');
      await context.close();
    });
