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
