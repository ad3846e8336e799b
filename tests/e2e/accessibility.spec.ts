import AxeBuilder from '@axe-core/playwright';
import { expect, test, type Page } from '@playwright/test';

import { openStarter, signInAs } from './sign-in';

async function seriousFindings(page: Page): Promise<string[]> {
  const { violations } = await new AxeBuilder({ page }).analyze();
  return violations
    .filter(({ impact }) => impact === 'serious' || impact === 'critical')
    .flatMap(({ id, nodes }) => nodes.map((node) => `${id}: ${node.html.slice(0, 160)}`));
}

/** Promise: axe finds nothing serious on any page, light or dark. */
for (const colorScheme of ['light', 'dark'] as const) {
  test.describe(colorScheme, () => {
    test.use({ colorScheme });

    test('pages for visitors', async ({ page }) => {
      for (const place of [
        '/sign-in',
        '/sign-up',
        '/forgotten',
        '/reset?token=x',
        '/confirm?token=x',
        '/nowhere',
      ]) {
        await page.goto(place);
        await expect(page.getByRole('heading').first()).toBeVisible();
        expect(await seriousFindings(page), place).toEqual([]);
      }
    });

    test('pages for people', async ({ page }) => {
      await signInAs(page, 'Ada Fennimore');
      for (const place of ['/', '/presets', '/lab', '/account', '/mail', '/presets/new']) {
        await page.goto(place);
        await expect(page.getByRole('heading').first()).toBeVisible();
        await page.waitForTimeout(500);
        expect(await seriousFindings(page), place).toEqual([]);
      }
    });

    test('the workbench in each arrangement', async ({ page }) => {
      await signInAs(page, 'Rui Maddock');
      await openStarter(page, 'saturating-two-sex-predator');
      await expect(page.getByRole('region', { name: /Special points/ })).toBeVisible({ timeout: 30_000 });
      for (const arrangement of ['Explore', 'Sweep', 'Two parameters', 'Long run', 'Model']) {
        await page.getByRole('tab', { name: arrangement, exact: true }).click();
        await page.waitForTimeout(800);
        expect(await seriousFindings(page), arrangement).toEqual([]);
      }
      for (const name of ['Export', 'Save a copy']) {
        await page.getByRole('button', { name, exact: true }).click();
        await expect(page.getByRole('dialog')).toBeVisible();
        expect(await seriousFindings(page), name).toEqual([]);
        await page.keyboard.press('Escape');
      }
      await page.getByRole('button', { name: 'Add process' }).first().click();
      await page.getByRole('menuitem', { name: 'Predation' }).click();
      await expect(page.getByRole('dialog')).toBeVisible();
      expect(await seriousFindings(page), 'template').toEqual([]);
      await page.keyboard.press('Escape');
      await page.keyboard.press('Control+k');
      await expect(page.getByRole('dialog')).toBeVisible();
      expect(await seriousFindings(page), 'palette').toEqual([]);
    });
  });
}
