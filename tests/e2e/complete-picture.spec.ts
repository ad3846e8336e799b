import { expect, test } from '@playwright/test';

import { Bench } from './bench';
import { openStarter, signInAs } from './sign-in';

/**
 * Promise: with the saturating predator in two sexes one gets, in the workbench alone, the onset of cycles for split
 * and pooled, the cycles with their lowest densities, the boundary over spread and ceiling, a map that agrees, and
 * the figure; and can rerun it.
 */
test('onset, cycles, boundary, map and long run of the saturating predator', async ({ page }) => {
  test.setTimeout(180_000);
  await signInAs(page, 'Rui Maddock');
  await openStarter(page, 'saturating-two-sex-predator');
  const bench = new Bench(page);

  // Known facts of the preset: 1.325 split, 1.375 pooled.
  const points = bench.findings.getByRole('region', { name: 'Special points' });
  await expect(points.getByRole('row', { name: /Hopf.*1\.325.*1\.375/ })).toBeVisible({ timeout: 30_000 });
  const verdict = bench.findings.getByRole('region', { name: 'Does the split stabilise?' });
  await expect(verdict).toContainText('cycle lowest', { timeout: 30_000 });
  await expect(bench.findings).toContainText(/period 20\.68 week/);

  await page.getByRole('tab', { name: 'Two parameters' }).click();
  const pane = page.getByRole('region', { name: 'Two parameters', exact: true });
  await expect(pane.getByLabel('up', { exact: true })).toHaveValue('dial:spread');
  await pane.getByRole('button', { name: 'Trace boundaries' }).click();
  await expect(pane.getByText('onset of cycles (Hopf)').first()).toBeVisible({ timeout: 30_000 });
  await pane.getByRole('button', { name: 'Compute map' }).click();
  await expect(pane.getByText('coexistence attracts')).toBeVisible({ timeout: 30_000 });
  await expect(page.getByRole('button', { name: 'Cancel' })).toHaveCount(0, { timeout: 60_000 });

  // The ring at the present values moves both by the keyboard.
  const spread = page.getByRole('textbox', { name: 'Spread, value' }).first();
  const before = await spread.inputValue();
  await pane.getByRole('button', { name: /^Present values/ }).press('Shift+ArrowDown');
  await expect(spread).not.toHaveValue(before);
  await page.keyboard.press('Control+z');

  const download = page.waitForEvent('download');
  await pane.getByRole('button', { name: /^Export/ }).click();
  await page.getByRole('dialog').getByRole('button', { name: 'Save the file' }).click();
  expect((await download).suggestedFilename()).toMatch(/\.(svg|png|csv)$/);
  await page.keyboard.press('Escape');

  await page.getByRole('tab', { name: 'Long run' }).click();
  const run = page.getByRole('region', { name: 'Long run', exact: true }).first();
  await run.getByLabel('show', { exact: true }).selectOption('section');
  await run.getByRole('button', { name: 'Compute', exact: true }).click();
  await expect(run.getByText(/\d+ crossings/).first()).toBeVisible({ timeout: 60_000 });
  await bench.findings.getByRole('button', { name: 'Compute exponents' }).click();
  await expect(bench.findings.getByText('split: cycle')).toBeVisible({ timeout: 60_000 });
});
