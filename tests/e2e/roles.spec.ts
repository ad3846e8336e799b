import { expect, test } from '@playwright/test';

import { Bench } from './bench';
import { signInAs } from './sign-in';

/** Promise: each role sees what it may do, and why not otherwise. */
test('a student opens a lab preset, keeps a copy, and cannot save over it', async ({ page }) => {
  await signInAs(page, 'Sanna Weldon');
  await page.goto('/presets?kind=lab');
  await page
    .getByRole('link', { name: /lab copy/ })
    .first()
    .click();
  const bench = new Bench(page);
  await expect(bench.findings).toBeVisible();
  await expect(page.getByRole('button', { name: 'Save version' })).toHaveCount(0);
  await page.getByRole('button', { name: 'Save a copy' }).click();
  const dialog = page.getByRole('dialog');
  await dialog.getByRole('textbox', { name: 'Title' }).fill('My copy for the practical');
  await dialog.getByRole('button', { name: /^Save/ }).click();
  await expect(page.getByText(/version 1 · saved/)).toBeVisible();
  await expect(page.getByRole('button', { name: 'Save version' })).toBeVisible();
});

test('a collaborator sees a lab preset, and saves only copies', async ({ page }) => {
  await signInAs(page, 'Colm Lichfield');
  await page.goto('/presets?kind=lab');
  await page.getByRole('link', { name: /Jumping spiders.*lab copy/ }).click();
  await expect(page.getByRole('button', { name: 'Save a copy' })).toBeVisible();
  await expect(page.getByRole('button', { name: 'Save version' })).toHaveCount(0);
  await expect(page.getByRole('button', { name: 'Share', exact: true })).toBeDisabled();
});

test('sessions are listed and the others ended', async ({ page, browser }) => {
  await signInAs(page, 'Colm Lichfield');
  const other = await (await browser.newContext()).newPage();
  await signInAs(other, 'Colm Lichfield');
  await page.goto('/account');
  const sessions = page.getByRole('region', { name: 'Sessions' });
  await expect(sessions.getByText('this one')).toHaveCount(1);
  await sessions.getByRole('button', { name: 'End all others' }).click();
  await expect(sessions.getByRole('listitem')).toHaveCount(1);
  await other.goto('/presets');
  await expect(other.getByRole('heading', { name: 'Sign in' })).toBeVisible();
});

test('a visitor is asked to sign in and comes back to the page asked for', async ({ page }) => {
  await page.goto('/presets?kind=starter');
  await expect(page.getByRole('heading', { name: 'Sign in' })).toBeVisible();
  await page.getByRole('button', { name: /Colm Lichfield/ }).click();
  await expect(page).toHaveURL(/\/presets\?kind=starter/);
  await expect(page.getByText(/13 presets/)).toBeVisible();
});

test('a link that opens nothing says so', async ({ page }) => {
  await page.goto('/s/not-a-link-at-all-0123456789');
  await expect(page.getByRole('alert')).toContainText(/opens nothing/);
});

test('signing up, confirming by mail, and a forgotten password', async ({ page }) => {
  await page.goto('/sign-up');
  await page.getByLabel('Name').fill('Ines Carr');
  await page.getByLabel('E-mail').fill('ines@example.org');
  await page.getByLabel('Password').fill('moss and lichen');
  await page.getByRole('button', { name: 'Make the account' }).click();
  await page.getByRole('link', { name: 'Open the mail of the demo' }).click();
  await page.getByRole('link', { name: /confirm\?token/ }).click();
  await page.getByRole('button', { name: 'Finish and sign in' }).click();
  await expect(page.getByRole('heading', { name: 'Desk of Ines Carr' })).toBeVisible();
  await page.getByRole('button', { name: 'Account of Ines Carr' }).click();
  await page.getByRole('menuitem', { name: 'Sign out' }).click();
  await page.getByRole('link', { name: 'Forgotten password' }).click();
  await expect(page.getByRole('heading', { name: 'Forgotten password' })).toBeVisible();
  await page.getByLabel('E-mail').fill('ines@example.org');
  await page.getByRole('button', { name: 'Send the link' }).click();
  await page.getByRole('link', { name: 'Open the mail of the demo' }).click();
  await page.getByRole('link', { name: /reset\?token/ }).click();
  await page.getByRole('textbox', { name: 'New password' }).fill('heath and heather');
  await page.getByRole('button', { name: 'Change the password' }).click();
  await expect(page.getByRole('heading', { name: 'Sign in' })).toBeVisible();
  await page.getByLabel('E-mail').fill('ines@example.org');
  await page.getByLabel('Password').fill('heath and heather');
  await page.getByRole('button', { name: 'Sign in', exact: true }).click();
  await expect(page.getByRole('heading', { name: 'Desk of Ines Carr' })).toBeVisible();
});
