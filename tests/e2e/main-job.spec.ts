import { expect, test } from '@playwright/test';

import { Bench } from './bench';
import { signInAs } from './sign-in';

/** Promise: from nothing to a saved, shared sweep of a model that one typed in oneself. */
test('a researcher defines, explores, sweeps, keeps and shares a split population', async ({
  page,
  browser,
}) => {
  test.setTimeout(180_000);
  await signInAs(page, 'Rui Maddock');
  await page.getByRole('link', { name: 'New preset' }).click();
  const bench = new Bench(page);

  await bench.addPopulation('Aphids');
  await bench.addPopulation('Ladybirds');
  await page.getByRole('combobox', { name: 'Population to split' }).selectOption({ label: 'Ladybirds' });
  await page.getByRole('textbox', { name: /Names of its classes/ }).fill('males, females');
  await page.getByRole('button', { name: 'Split', exact: true }).click();

  await bench.addFromTemplate('Logistic growth', async (dialog) => {
    await dialog.getByRole('combobox', { name: 'Population' }).selectOption({ label: 'Aphids' });
  });
  await bench.addFromTemplate('Predation', async (dialog) => {
    await dialog.getByRole('combobox', { name: 'Consumer' }).selectOption({ label: 'Ladybirds' });
    await dialog
      .getByRole('combobox', { name: 'Response to food density' })
      .selectOption({ label: 'saturating' });
  });
  await bench.addFromTemplate('Deaths', async (dialog) => {
    await dialog.getByRole('combobox', { name: 'Population' }).selectOption({ label: 'Ladybirds' });
  });

  await bench.setNumber('Mortality of male ladybirds', '0.12');
  await bench.setNumber('Mortality of female ladybirds', '0,06');
  await expect(page.getByRole('textbox', { name: 'Mortality of female ladybirds' })).toHaveValue('0.06');
  await expect(page.getByRole('region', { name: 'Equations' }).locator('.katex').first()).toBeVisible();
  await expect(bench.findings.getByRole('heading', { name: /^Coexistence/ })).toHaveCount(1, {
    timeout: 30_000,
  });

  await bench.chooseSwept('Carrying capacity');
  await bench.sweep('0.2', '30');
  const points = bench.findings.getByRole('region', { name: /Special points/ });
  await expect(points.getByRole('row', { name: /Hopf/ })).toBeVisible({ timeout: 60_000 });
  await expect(points.getByRole('row', { name: /transcritical/ })).toBeVisible();
  await expect(bench.findings.getByRole('region', { name: 'Does the split stabilise?' })).toContainText(
    /pooled/,
  );

  const capacity = page.getByRole('textbox', { name: 'Carrying capacity of aphids, value' });
  const before = await capacity.inputValue();
  await points.locator('button:enabled', { hasText: 'Hopf' }).first().click();
  await expect(capacity).not.toHaveValue(before);
  const located = Number(await capacity.inputValue());
  const shown = await points.getByRole('row', { name: /Hopf/ }).getByRole('cell').first().textContent();
  expect(Math.abs(located / Number(shown) - 1)).toBeLessThan(1e-3);
  await expect(bench.strip.getByRole('button', { name: /^Go to Hopf/ }).first()).toBeVisible();
  await expect(page.getByRole('region', { name: 'Problems' })).toBeHidden();

  await page.getByRole('button', { name: 'Save version' }).click();
  const saving = page.getByRole('dialog');
  await saving.getByRole('textbox', { name: 'Title' }).fill('Ladybirds on aphids, by sex');
  await saving.getByRole('textbox', { name: 'Note' }).fill('first sweep');
  await saving.getByRole('button', { name: /^Save/ }).click();
  await expect(page).toHaveURL(/\/presets\/[\w-]{10,}/);
  await expect(page.getByText(/version 1 · saved/)).toBeVisible();

  await bench.setNumber('Mortality of male ladybirds', '0.1');
  await bench.save('gentler winters');
  await expect(page.getByText(/version 2 · saved/)).toBeVisible();

  await page.getByRole('button', { name: 'More commands' }).click();
  await page.getByRole('menuitem', { name: /history/i }).click();
  const history = page.getByRole('dialog', { name: 'Version history' });
  await history.getByRole('button', { name: /^Compare version 1/ }).click();
  await expect(history.getByRole('region', { name: 'Comparison' })).toContainText(/0\.12[\s\S]*0\.1/);
  await page.keyboard.press('Escape');

  await page.getByRole('button', { name: 'Share', exact: true }).click();
  const sharing = page.getByRole('dialog');
  await sharing.getByRole('textbox', { name: 'Who is it for?' }).fill('a reviewer');
  await sharing.getByRole('button', { name: /link/i }).click();
  const address = await sharing.getByRole('textbox', { name: 'Address of the new link' }).inputValue();
  expect(address).toMatch(/\/s\/[\w-]{40,}$/);

  const visitor = await (await browser.newContext()).newPage();
  await visitor.goto(address);
  await expect(visitor.getByText('Shared preset.')).toBeVisible();
  const theirs = new Bench(visitor);
  await expect(theirs.findings.getByRole('heading', { name: /^Coexistence/ })).toBeVisible({
    timeout: 30_000,
  });
  await theirs.setNumber('Mortality of male ladybirds', '0.2');
  await expect(visitor.getByRole('button', { name: 'Save version' })).toHaveCount(0);

  await sharing.getByRole('button', { name: 'Revoke a reviewer' }).click();
  await expect(sharing.getByRole('list', { name: 'Links' })).toContainText(/revoked/);
  await expect(async () => {
    await visitor.goto(address);
    await expect(visitor.getByRole('alert')).toContainText(/opens nothing/, { timeout: 3_000 });
  }).toPass({ timeout: 20_000 });
});
