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

test('text cannot be run as code', async ({ page }) => {
  await page.goto('/sign-in');
  await expect(page.getByRole('heading', { name: 'Sign in' })).toBeVisible();
  // A handler of the page's own, so that the page's policy applies to it.
  const refused = await page.evaluate(
    () =>
      new Promise<string>((resolve) => {
        const script = document.createElement('script');
        script.textContent = 'window.inlineRan = true';
        document.addEventListener('securitypolicyviolation', (event) => resolve(event.effectiveDirective), {
          once: true,
        });
        document.head.append(script);
        setTimeout(() => resolve('nothing was refused'), 2000);
      }),
  );
  expect(refused).toMatch(/^script-src/);
});
