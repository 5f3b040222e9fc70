import type { Page } from '@playwright/test';

/** Signs in on the page, as a member of the demonstration lab or of the other one. */
export async function signIn(page: Page, email = 'analyst@demo.outfold.test'): Promise<void> {
  await page.goto('/sign-in');
  await page.getByLabel('Mail address').fill(email);
  await page.getByLabel('Password').fill(process.env.DEMO_PASSWORD ?? '');
  await page.getByRole('button', { name: 'Sign in' }).click();
  await page.waitForURL((url) => url.pathname !== '/sign-in');
}
