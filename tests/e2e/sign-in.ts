import { expect, type Page } from '@playwright/test';

/** Signs in as one of the invented people of the demo. */
export async function signInAs(
  page: Page,
  name: 'Ada Fennimore' | 'Rui Maddock' | 'Sanna Weldon' | 'Colm Lichfield',
): Promise<void> {
  await page.goto('/sign-in');
  await page.getByRole('button', { name: new RegExp(name) }).click();
  await expect(page.getByRole('heading', { name: `Desk of ${name}` })).toBeVisible();
}

/** Opens a starter preset and waits until its equilibria are there. */
export async function openStarter(page: Page, key: string): Promise<void> {
  await page.goto(`/presets/starter-${key}`);
  await expect(page.getByRole('complementary', { name: 'Findings' })).toContainText(
    /Does the split stabilise/,
  );
  await expect(page.getByRole('heading', { name: /^Coexistence/ }).first()).toBeVisible({ timeout: 30_000 });
}
