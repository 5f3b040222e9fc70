import { readFile } from 'node:fs/promises';
import { expect, test } from '@playwright/test';
import { signIn } from './support/sign-in';

test.describe.configure({ mode: 'serial' });

let sessionPath = '';
let readoutPath = '';

test('from sign-in to a verdict with its plots and its record', async ({ page }) => {
  await signIn(page);
  await page.getByRole('button', { name: 'New study' }).click();
  await page.getByLabel('Name').fill(`First study ${Date.now()}`);
  await page.getByLabel('Question').fill('Do these units carry the shared fraction?');
  await page.getByRole('button', { name: 'Create the study' }).click();
  await page.waitForURL(/\/studies\//);

  await page.getByRole('button', { name: 'Add an animal' }).first().click();
  await page.getByLabel('Code').fill('Clover');
  await page.getByLabel('Species').fill('Callithrix jacchus');
  await page.getByRole('button', { name: 'Add the animal' }).click();
  await expect(page.getByRole('dialog')).toBeHidden();

  await page.getByRole('button', { name: 'Bring a session in' }).first().click();
  await page.getByLabel('Started').fill('2026-06-11T09:30');
  await page.getByRole('button', { name: 'Open the session' }).click();
  await page.waitForURL(/\/sessions\/.*\/intake/);
  sessionPath = new URL(page.url()).pathname.replace('/intake', '');

  await page.getByLabel('Files to add').setInputFiles('tests/fixtures/sessions/small.npz');
  const arrays = page.getByRole('table', { name: /arrays found/i });
  await expect(arrays.getByRole('row', { name: /counts.*uint8.*240 × 60 × 12/ })).toBeVisible();
  // Nothing in the file says when its first bin starts, so the page asks.
  const start = page.getByLabel('Start of the first bin, ms from the alignment event');
  await start.fill('0');
  await start.press('Tab');
  await expect(page.getByRole('heading', { name: 'First trials' })).toBeVisible();
  await page.getByRole('button', { name: /Confirm data version/ }).click();
  await page.getByRole('link', { name: 'To the session' }).click();
  await page.waitForURL((url) => url.pathname === sessionPath);
  await expect(page.getByRole('heading', { level: 1 })).toContainText('Clover');

  await page.getByRole('link', { name: 'New readout' }).first().click();
  await page.waitForURL(/\/readouts\/new/);
  await expect(page.getByRole('main')).toContainText(/1\s000\sshuffles/);
  await page.getByRole('button', { name: 'Run readout' }).click();
  await page.waitForURL(/\/readouts\/[0-9a-f-]{36}$/);
  readoutPath = new URL(page.url()).pathname;

  await expect(page.getByText(/carry the shared.fraction/).first()).toBeVisible({ timeout: 60_000 });
  for (const heading of ['Fold strip', 'Held-out against true', 'Record'])
    await expect(page.getByRole('heading', { name: heading })).toBeVisible();
  await expect(page.getByText(/nested cross-validation/).first()).toBeVisible();
  await expect(page.getByText(/test-trial interval, readouts held fixed/i).first()).toBeVisible();

  const download = page.waitForEvent('download');
  await page.getByRole('button', { name: 'CSV' }).first().click();
  const csv = await readFile(await (await download).path(), 'utf8');
  expect(csv.trim().split('\n').length).toBeGreaterThan(5);
});

test('a running readout survives a reload, can be cancelled, and stays in the ledger', async ({ page }) => {
  await signIn(page);
  const started = await page.request.post(`/api/v1${sessionPath}/readouts`, {
    headers: { origin: new URL(page.url()).origin },
    data: {
      recipe: { label: 'shared_fraction', features: 'bins', null: { kind: 'free', draws: 100_000 }, seed: 3 },
    },
  });
  expect(started.status()).toBe(201);
  const { id } = (await started.json()) as { id: string };
  await page.goto(`/readouts/${id}`);
  await expect(page.getByText(/is running/)).toBeVisible();
  await page.reload();
  await expect(page.getByText(/is running/)).toBeVisible();
  await expect(page.getByRole('progressbar')).toBeVisible();
  await page.getByRole('button', { name: 'Cancel' }).click();
  await expect(page.getByText(/cancelled/).first()).toBeVisible({ timeout: 10_000 });

  await page.goto(sessionPath);
  const ledger = page.getByRole('table', { name: /attempt ledger/i });
  const numbers = ledger.locator('tbody tr > :first-child');
  await expect(numbers.nth(0)).toHaveText('2');
  await expect(numbers.nth(1)).toHaveText('1');
  await expect(ledger.getByText(/cancelled/)).toBeVisible();
});

test('a trial left out with a reason stays out of the next readout', async ({ page }) => {
  await signIn(page);
  await page.goto(sessionPath);
  const strip = page.getByRole('slider', { name: /fold strip/i });
  // The strip is drawn by the server; it answers to keys once the page has come alive.
  await expect(async () => {
    await strip.focus();
    await page.keyboard.press('Home');
    await expect(strip).toHaveAttribute('aria-valuetext', /^trial 1\b/, { timeout: 500 });
  }).toPass();
  await page.keyboard.press('Shift+ArrowRight');
  await page.keyboard.press('x');
  await page.getByLabel(/reason/i).fill('The animal looked away.');
  await page.getByRole('button', { name: /^Leave out/ }).click();
  await expect(page.getByText('The animal looked away.').first()).toBeVisible();
  const exclusions = await page.request.get(`/api/v1${sessionPath}/exclusions`);
  expect(await exclusions.json()).toMatchObject({ version: 1, excludedTrials: [0, 1] });
});

test('a member of another lab finds nothing', async ({ page }) => {
  await signIn(page, 'lead@other.outfold.test');
  for (const path of [sessionPath, readoutPath]) {
    const response = await page.goto(path);
    expect(response?.status(), path).toBe(404);
    await expect(page.getByRole('heading', { name: 'There is nothing here' })).toBeVisible();
  }
});
