import { expect, test } from '@playwright/test';

import { signInAs } from './sign-in';

/** Promise: supervisors read who did what, filtered and as a file; everyone reads the events of their own account. */
test('history of a lab and events of an account', async ({ page, browser }) => {
  await signInAs(page, 'Ada Fennimore');
  await page.goto('/lab?in=demo-lab');
  await page.getByRole('link', { name: 'History' }).click();
  await expect(page.getByRole('heading', { name: 'History', level: 1 })).toBeVisible();
  await expect(
    page.getByRole('listitem').filter({ hasText: 'opened an assigned sweep' }).first(),
  ).toBeVisible();
  await page
    .getByRole('combobox', { name: 'What was done' })
    .selectOption({ label: 'drafted an assigned sweep' });
  await expect(page.getByRole('listitem').filter({ hasText: 'opened an assigned sweep' })).toHaveCount(0);
  await expect(page.getByRole('listitem').first()).toContainText('Ada Fennimore drafted an assigned sweep');
  const [file] = await Promise.all([
    page.waitForEvent('download'),
    page.getByRole('link', { name: 'Download as CSV' }).click(),
  ]);
  expect(file.suggestedFilename()).toBe('history.csv');
  await page.getByLabel('From').fill('2031-01-01');
  await expect(page.getByText('Nothing of that kind was done.')).toBeVisible();

  const student = await (await browser.newContext()).newPage();
  await signInAs(student, 'Sanna Weldon');
  await student.goto('/lab/history?in=demo-lab');
  await expect(student.getByText('The history of a lab is for its supervisors.')).toBeVisible();
  await student.goto('/account');
  await expect(student.getByRole('region', { name: 'Events of your account' })).toContainText('signed in');
});

/** Promise: whoever deletes their account knows before what goes, and is signed out afterwards. */
test('an account is deleted with its consequences told', async ({ page }) => {
  await page.goto('/sign-up');
  await page.getByLabel('Name').fill('Wren Alder');
  await page.getByLabel('E-mail').fill('wren@example.org');
  await page.getByLabel('Password').fill('catkins in spring');
  await page.getByRole('button', { name: 'Make the account' }).click();
  await expect(async () => {
    await page.goto('/mail');
    await page
      .getByRole('button', { name: /Confirm your Moiety account/ })
      .filter({ hasText: 'wren@example.org' })
      .first()
      .click({ timeout: 2_000 });
  }).toPass({ timeout: 20_000 });
  await page.getByRole('link', { name: /confirm\?token/ }).click();
  await page.getByRole('button', { name: 'Finish and sign in' }).click();
  await expect(page.getByRole('heading', { name: 'Desk of Wren Alder' })).toBeVisible();
  await page.goto('/account');
  await page.getByRole('button', { name: 'Delete the account…' }).click();
  const dialog = page.getByRole('dialog');
  await expect(dialog).toContainText('0 presets that only you see are deleted');
  await dialog.getByLabel('Your password').fill('not the password');
  await dialog.getByRole('button', { name: 'Delete the account' }).click();
  await expect(dialog).toContainText('This is not your password.');
  await dialog.getByLabel('Your password').fill('catkins in spring');
  await dialog.getByRole('button', { name: 'Delete the account' }).click();
  await expect(page).toHaveURL(/\/sign-in$/);
  await page.getByLabel('E-mail').fill('wren@example.org');
  await page.getByLabel('Password').fill('catkins in spring');
  await page.getByRole('button', { name: 'Sign in', exact: true }).click();
  await expect(page.getByText(/not right/)).toBeVisible();
});
