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

    test('pages of assigned sweeps, for who sets one and whom it is for', async ({ page, browser }) => {
      await signInAs(page, 'Ada Fennimore');
      await page.goto('/lab/sweeps?in=demo-lab');
      const sweep = page.getByRole('link', { name: 'The effort that loses the sturgeon', exact: true });
      await expect(sweep).toBeVisible();
      expect(await seriousFindings(page), 'list').toEqual([]);
      const id = /assigned\/([^/]+)/.exec((await sweep.getAttribute('href')) ?? '')?.[1] ?? '';
      for (const place of [`/assigned/${id}/set`, `/assigned/${id}/review`]) {
        await page.goto(place);
        await expect(page.getByRole('heading', { name: /sturgeon/ }).first()).toBeVisible();
        await page.waitForTimeout(800);
        expect(await seriousFindings(page), place).toEqual([]);
      }
      const student = await (await browser.newContext({ colorScheme })).newPage();
      await signInAs(student, 'Sanna Weldon');
      await student.goto(`/assigned/${id}`);
      await expect(student.locator('.katex').first()).toBeVisible();
      expect(await seriousFindings(student), 'task').toEqual([]);
      await student.getByRole('link', { name: /workbench/ }).click();
      await expect(student.getByRole('button', { name: /^Pin as/ }).first()).toBeVisible({ timeout: 30_000 });
      expect(await seriousFindings(student), 'work').toEqual([]);
      await student.getByRole('button', { name: 'Hand in…' }).click();
      await expect(student.getByRole('dialog')).toBeVisible();
      expect(await seriousFindings(student), 'hand-in').toEqual([]);
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
