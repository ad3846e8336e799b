import { expect, test } from '@playwright/test';

import { Bench } from './bench';
import { openStarter, signInAs } from './sign-in';

/** Promise: nonsense is told where it stands, loses nothing, and can be undone. */
test('a formula that cannot be read is marked, and the last valid model stays', async ({ page }) => {
  await signInAs(page, 'Rui Maddock');
  await openStarter(page, 'self-regulated-prey');
  const bench = new Bench(page);
  const rate = page.getByRole('textbox', { name: 'Rate of Deer eaten by lynx' });
  await rate.fill('a*x*yy');
  await rate.press('Enter');
  const problems = page.getByRole('region', { name: 'Problems' });
  await expect(problems).toContainText(/yy/);
  await expect(page.getByText(/Did you mean/).first()).toBeVisible();
  await expect(bench.findings.getByRole('heading', { name: /^Coexistence/ })).toBeVisible();
  await rate.fill('a*(x*y');
  await rate.press('Enter');
  await expect(problems).toContainText(/parenthes/);
  await rate.fill('2x');
  await rate.press('Enter');
  await expect(problems).toContainText(/2\*x/);
  await page.keyboard.press('Escape');
  // Typing in one field is one step.
  await page.getByRole('button', { name: /^Undo/ }).click();
  await expect(rate).toHaveValue('a*x*y');
  await expect(problems).toBeHidden();
});

test('a number that is none keeps its text and says why', async ({ page }) => {
  await signInAs(page, 'Rui Maddock');
  await openStarter(page, 'two-sex-predator');
  const cell = page.getByRole('textbox', { name: 'Mortality of males' });
  const field =
    (await cell.count()) > 0 ? cell : page.getByRole('textbox', { name: /[Mm]ortality of male/ }).first();
  await field.fill('often');
  await field.press('Tab');
  await expect(field).toHaveValue('often');
  await expect(field).toHaveAttribute('aria-invalid', 'true');
  await field.fill('7e-1');
  await field.press('Enter');
  await expect(field).toHaveValue('0.7');
});

test('shares that do not sum to one are marked', async ({ page }) => {
  await signInAs(page, 'Rui Maddock');
  await openStarter(page, 'two-sex-predator');
  const share = page.getByRole('textbox', { name: /share of births of male/i }).first();
  await share.fill('0.8');
  await share.press('Enter');
  await expect(page.getByRole('region', { name: 'Problems' })).toContainText(/sum to 1/);
  await expect(
    page
      .getByRole('complementary', { name: 'Findings' })
      .getByText(/^Coexistence/)
      .first(),
  ).toBeVisible();
  await page.getByRole('button', { name: /^Undo/ }).click();
  await expect(share).toHaveValue('0.5');
  await expect(page.getByRole('region', { name: 'Problems' })).toBeHidden();
});

test('a draft outlives the tab and is offered again', async ({ page, context }) => {
  await signInAs(page, 'Ada Fennimore');
  await openStarter(page, 'two-competitors');
  const value = page.getByRole('textbox', { name: 'growth of grey, value' });
  await value.fill('1.25');
  await value.press('Enter');
  await page.waitForTimeout(800);
  const address = page.url();
  await page.close({ runBeforeUnload: false });
  const again = await context.newPage();
  await again.goto(address);
  await again
    .getByRole('dialog', { name: 'Unsaved work was kept' })
    .getByRole('button', { name: 'Restore draft' })
    .click();
  await expect(again.getByRole('textbox', { name: 'growth of grey, value' })).toHaveValue('1.25');
});

test('of two people who save over each other the second is told and keeps both', async ({
  page,
  browser,
}) => {
  test.setTimeout(120_000);
  await signInAs(page, 'Rui Maddock');
  await page.goto('/presets?kind=lab');
  await page.getByRole('link', { name: /Sturgeon.*lab copy/ }).click();
  await expect(page.getByText(/version 1 ·/)).toBeVisible();
  const other = await (await browser.newContext()).newPage();
  await signInAs(other, 'Ada Fennimore');
  await other.goto(page.url());
  await expect(other.getByText(/version 1 ·/)).toBeVisible();

  const change = async (bench: Bench, value: string) => bench.setNumber('growth, value', value);
  await change(new Bench(other), '0.7');
  await new Bench(other).save('from the supervisor');
  await change(new Bench(page), '0.8');
  await page.getByRole('button', { name: 'Save version' }).click();
  const dialog = page.getByRole('dialog');
  await dialog.getByRole('button', { name: 'Save', exact: true }).click();
  await expect(dialog).toContainText(/Ada Fennimore/);
  await dialog.getByRole('button', { name: /copy/i }).click();
  await expect(page.getByText(/version 1 · saved/)).toBeVisible();
  await expect(page.getByRole('textbox', { name: 'growth, value' })).toHaveValue('0.8');
  await other.reload();
  await expect(other.getByText(/version 2 ·/)).toBeVisible();
  await expect(other.getByRole('textbox', { name: 'growth, value' })).toHaveValue('0.7');
});
