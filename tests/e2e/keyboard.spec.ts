import { expect, test, type Page } from '@playwright/test';

/** Moves the focus by Tab until it is on a control of that name; fails after a full round. */
async function tabTo(page: Page, name: RegExp): Promise<void> {
  for (let k = 0; k < 250; k += 1) {
    const focused = await page.evaluate(() => {
      const element = document.activeElement;
      if (!element || element === document.body) return '';
      const labels = 'labels' in element ? [...((element as HTMLInputElement).labels ?? [])] : [];
      return [
        element.getAttribute('aria-label'),
        ...labels.map((one) => one.textContent),
        element.textContent,
      ]
        .filter(Boolean)
        .join(' | ');
    });
    if (name.test(focused)) return;
    await page.keyboard.press('Tab');
  }
  throw new Error(`Tab never reached ${name}`);
}

/** Moves down an open menu to an entry. */
async function arrowTo(page: Page, name: string): Promise<void> {
  for (let k = 0; k < 30; k += 1) {
    await page.keyboard.press('ArrowDown');
    // The menu moves its focus in a task of its own.
    await page.waitForTimeout(60);
    if ((await page.evaluate(() => document.activeElement?.textContent ?? '')).startsWith(name)) return;
  }
  throw new Error(`The menu has no ${name}`);
}

async function command(page: Page, words: string): Promise<void> {
  await page.keyboard.press('Control+k');
  await expect(page.getByRole('dialog')).toBeVisible();
  await page.keyboard.type(words);
  await page.keyboard.press('Enter');
}

/** Promise: the whole job with the keyboard alone; nothing here touches the mouse. */
test('typing a model, sweeping it, going to a special point and saving, by keyboard', async ({ page }) => {
  test.setTimeout(150_000);
  await page.goto('/sign-in');
  await expect(page.getByRole('button', { name: /Rui Maddock/ })).toBeVisible();
  await tabTo(page, /Rui Maddock/);
  await page.keyboard.press('Enter');
  await expect(page.getByRole('heading', { name: 'Desk of Rui Maddock' })).toBeVisible();
  await tabTo(page, /^New preset$/);
  await page.keyboard.press('Enter');
  await expect(page.getByRole('heading', { name: 'Begin a model' })).toBeVisible();

  await command(page, 'Type equations');
  await expect(page.getByRole('dialog', { name: 'Type equations' })).toBeVisible();
  await tabTo(page, /Equations/);
  await page.keyboard.type("x' = x*(1 - x/K) - x*y/(1 + x)");
  await page.keyboard.press('Enter');
  await page.keyboard.type("y' = x*y/(1 + x) - 0.4*y");
  await tabTo(page, /Put on the bench/);
  await page.keyboard.press('Enter');
  const findings = page.getByRole('complementary', { name: 'Findings' });
  await expect(findings.getByRole('region', { name: 'Equilibria' })).toBeVisible();

  await tabTo(page, /Along the strip/);
  await page.keyboard.press('Enter');
  await page.keyboard.type('K');
  await page.keyboard.press('Enter');
  await tabTo(page, /^to$/);
  await page.keyboard.press('Control+a');
  await page.keyboard.type('5');
  await page.keyboard.press('Enter');
  await command(page, 'Run the sweep');
  const hopf = findings.getByRole('region', { name: /Special points/ }).getByRole('button', { name: /Hopf/ });
  await expect(hopf).toBeVisible({ timeout: 30_000 });
  await tabTo(page, /^Hopf/);
  await page.keyboard.press('Enter');
  // Rosenzweig & MacArthur 1963, textbook closed form: K = (e + m h)/(a h (e - m h)) = 7/3.
  await expect(page.getByRole('textbox', { name: 'K, value' })).toHaveValue(/^2\.33333/);

  await command(page, 'Save');
  const dialog = page.getByRole('dialog');
  await expect(dialog).toBeVisible();
  await tabTo(page, /^Title/);
  await page.keyboard.press('Control+a');
  await page.keyboard.type('Typed by keyboard');
  await tabTo(page, /^Save$/);
  await page.keyboard.press('Enter');
  await expect(page.getByText(/version 1 · saved/)).toBeVisible();
});

test('defining a split population from nothing, by keyboard', async ({ page }) => {
  test.setTimeout(150_000);
  await page.goto('/sign-in');
  await expect(page.getByRole('button', { name: /Rui Maddock/ })).toBeVisible();
  await tabTo(page, /Rui Maddock/);
  await page.keyboard.press('Enter');
  await expect(page.getByRole('heading', { name: 'Desk of Rui Maddock' })).toBeVisible();
  await tabTo(page, /^New preset$/);
  await page.keyboard.press('Enter');
  await expect(page.getByRole('heading', { name: 'Begin a model' })).toBeVisible();

  for (const name of ['Mites', 'Thrips']) {
    await tabTo(page, /Name of the population/);
    await page.keyboard.type(name);
    await page.keyboard.press('Enter');
  }
  await tabTo(page, /Population to split/);
  await page.keyboard.press('ArrowDown');
  await tabTo(page, /Names of its classes/);
  await page.keyboard.type('males, females');
  await page.keyboard.press('Enter');
  await expect(page.getByRole('textbox', { name: 'Name of class T1' })).toHaveValue('males');

  await tabTo(page, /^Logistic growth$/);
  await page.keyboard.press('Enter');
  await expect(page.getByRole('dialog', { name: 'Logistic growth' })).toBeVisible();
  await tabTo(page, /^Add$/);
  await page.keyboard.press('Enter');
  for (const [template, population] of [
    ['Predation', null],
    ['Deaths', 'Thrips'],
  ] as const) {
    await tabTo(page, /^Add process|^Process$/);
    await page.keyboard.press('Enter');
    await expect(page.getByRole('menu')).toBeVisible();
    await arrowTo(page, template);
    await page.keyboard.press('Enter');
    await expect(page.getByRole('dialog', { name: template })).toBeVisible();
    if (population) {
      await tabTo(page, /^Population/);
      await page.keyboard.type(population);
    }
    await tabTo(page, /^Add$/);
    await page.keyboard.press('Enter');
    await expect(page.getByRole('dialog')).toBeHidden();
  }
  await tabTo(page, /Mortality of male thrips/);
  await page.keyboard.press('Control+a');
  await page.keyboard.type('0.8');
  await page.keyboard.press('Enter');
  await expect(
    page
      .getByRole('complementary', { name: 'Findings' })
      .getByText(/The split/)
      .first(),
  ).toBeVisible({
    timeout: 30_000,
  });
});
