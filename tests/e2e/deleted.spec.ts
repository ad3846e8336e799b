import { expect, test } from '@playwright/test';

import { openStarter, signInAs } from './sign-in';

/** Promise: what was deleted by mistake is brought back by its owner. */
test('a deleted preset is brought back from the library', async ({ page }) => {
  await signInAs(page, 'Rui Maddock');
  await openStarter(page, 'self-regulated-prey');
  await page.getByRole('button', { name: 'Save a copy' }).click();
  const dialog = page.getByRole('dialog');
  await dialog.getByRole('textbox', { name: 'Title' }).fill('Roe deer to be missed');
  await dialog.getByRole('button', { name: /^Save/ }).click();
  await expect(dialog).toBeHidden();

  await page.goto('/presets?search=to+be+missed');
  const card = page.getByRole('listitem').filter({ hasText: 'Roe deer to be missed' });
  await card.getByRole('button', { name: /^More for/ }).click();
  await page.getByRole('menuitem', { name: /^Delete/ }).click();
  await page.getByRole('dialog').getByRole('button', { name: 'Delete', exact: true }).click();
  await expect(card).toHaveCount(0);

  await page.getByText('Deleted presets', { exact: true }).click();
  await page.getByRole('button', { name: 'Bring back Roe deer to be missed' }).click();
  await expect(page.getByRole('link', { name: /Roe deer to be missed/ })).toBeVisible();
});
