import { expect, test } from '@playwright/test';

import { openStarter, signInAs } from './sign-in';

/** Promise: nothing is fetched from elsewhere, and the pages obey their own policy. */
test('no page asks another host, breaks the policy or logs an error', async ({ page, baseURL }) => {
  const foreign: string[] = [];
  const errors: string[] = [];
  page.on('request', (request) => {
    const url = request.url();
    if (!url.startsWith(baseURL ?? '') && !/^(blob|data):/.test(url)) foreign.push(url);
  });
  page.on('console', (message) => {
    if (message.type() === 'error') errors.push(message.text());
  });
  page.on('pageerror', (error) => errors.push(error.message));
  await page.addInitScript(() => {
    document.addEventListener('securitypolicyviolation', (event) => {
      console.error(`policy: ${event.violatedDirective} ${event.blockedURI}`);
    });
  });
  await signInAs(page, 'Rui Maddock');
  for (const place of ['/', '/presets', '/lab', '/account', '/mail']) {
    await page.goto(place);
    await expect(page.getByRole('heading').first()).toBeVisible();
  }
  await openStarter(page, 'saturating-two-sex-predator');
  await page.getByRole('tab', { name: 'Sweep' }).click();
  await expect(page.getByRole('region', { name: /Special points/ })).toBeVisible({ timeout: 30_000 });
  await page.getByRole('tab', { name: 'Model' }).click();
  await page.waitForTimeout(500);
  expect(foreign).toEqual([]);
  expect(errors).toEqual([]);
});

test('text cannot be run as code, neither inline nor by eval', async ({ page }) => {
  await page.goto('/sign-in');
  await expect(page.getByRole('heading', { name: 'Sign in' })).toBeVisible();
  const refused = await page.evaluate(
    () =>
      new Promise<string[]>((resolve) => {
        const seen: string[] = [];
        document.addEventListener('securitypolicyviolation', (event) =>
          seen.push(`${event.effectiveDirective} ${event.blockedURI}`),
        );
        const script = document.createElement('script');
        script.textContent = 'window.inlineRan = true';
        document.head.append(script);
        // Compiled by the page itself when the timer fires, so that the page's policy decides.
        setTimeout('window.textRan = true', 0);
        setTimeout(() => resolve(seen), 1000);
      }),
  );
  expect(refused).toContain('script-src-elem inline');
  expect(refused).toContain('script-src eval');
  expect(await page.evaluate(() => ['inlineRan', 'textRan'].filter((name) => name in window))).toEqual([]);
});
