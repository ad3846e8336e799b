import { expect, test } from '@playwright/test';

import { signInAs } from './sign-in';

/** Promise: two people discuss a special point, by mail and in place; links show, and end, as they were made. */
test('comment on a point with a mention, follow the mail, reply, resolve; links for looking alone', async ({
  page: rui,
  browser,
}) => {
  test.setTimeout(150_000);
  const other = async () => (await browser.newContext({ viewport: { width: 1440, height: 900 } })).newPage();
  await signInAs(rui, 'Rui Maddock');
  const { id, look, ended } = await rui.evaluate(async () => {
    const session = (await (await fetch('/api/session')).json()) as {
      csrfToken: string;
      user: { memberships: { labId: string }[] };
    };
    const send = async (method: string, path: string, body: unknown) => {
      const headers = { 'content-type': 'application/json', 'x-csrf-token': session.csrfToken };
      const answer = await fetch(`/api${path}`, { method, headers, body: JSON.stringify(body) });
      return (await answer.json()) as { preset: { id: string }; url: string; link: { id: string } };
    };
    const copy = await send('POST', '/presets/starter-saturating-two-sex-predator/duplicate', {});
    const preset = copy.preset.id;
    await send('PATCH', `/presets/${preset}`, {
      visibility: 'lab',
      labId: session.user.memberships[0]?.labId,
    });
    const first = await send('POST', `/presets/${preset}/links`, { label: 'look', access: 'view' });
    const second = await send('POST', `/presets/${preset}/links`, { label: 'ended' });
    const headers = { 'x-csrf-token': session.csrfToken };
    await fetch(`/api/presets/${preset}/links/${second.link.id}`, { method: 'DELETE', headers });
    return { id: preset, look: first.url, ended: second.url };
  });

  // A comment pinned to the Hopf point, with a mention by keyboard.
  await rui.goto(`/presets/${id}`);
  const findings = rui.getByRole('complementary', { name: 'Findings' });
  const points = findings.getByRole('region', { name: 'Special points' });
  await expect(points.getByRole('button', { name: 'Hopf' }).first()).toBeVisible({ timeout: 45_000 });
  await points.getByRole('button', { name: 'Hopf' }).first().click();
  await points.getByRole('button', { name: 'Comment on this point' }).first().click();
  const box = findings.getByRole('textbox', { name: 'New comment' });
  await box.fill('');
  await box.pressSequentially('Is this onset soft, @Ada');
  await expect(findings.getByRole('option', { name: 'Ada Fennimore' })).toBeVisible();
  await rui.keyboard.press('Enter');
  await findings.getByRole('button', { name: 'Comment', exact: true }).click();
  await expect(findings.getByRole('listitem', { name: /Thread begun by Rui/ })).toBeVisible();

  // Ada follows the link of the mail to the comment, looks at the point, replies and resolves.
  const ada = await other();
  await signInAs(ada, 'Ada Fennimore');
  await expect(async () => {
    await ada.goto('/mail');
    await ada
      .getByRole('button', { name: /mentions you in a comment/ })
      .first()
      .click({ timeout: 2_000 });
  }).toPass({ timeout: 20_000 });
  await ada.getByRole('link', { name: /comment=/ }).click();
  const thread = ada.getByRole('listitem', { name: /Thread begun by Rui/ });
  await expect(thread).toContainText('Is this onset soft', { timeout: 30_000 });
  await ada.getByRole('button', { name: /^Show the Hopf/ }).click();
  await expect(ada.getByRole('slider', { name: 'ceiling of midges, K' })).toHaveAttribute(
    'aria-valuetext',
    /^1\.324/,
  );
  await thread.getByRole('button', { name: 'Reply' }).click();
  await ada.getByRole('textbox', { name: /Reply to Rui/ }).fill('It is supercritical.');
  await thread.getByRole('button', { name: 'Reply', exact: true }).click();
  await expect(thread).toContainText('It is supercritical.');
  await ada.getByRole('button', { name: 'Resolve' }).click();
  await expect(ada.getByText(/Resolved by Ada/)).toBeVisible();

  // A link for looking alone opens and offers no copy; a withdrawn one opens nothing; neither shows comments.
  const visitor = await other();
  await visitor.goto(look);
  await expect(visitor.getByText('no copy can be made here')).toBeVisible({ timeout: 30_000 });
  await expect(visitor.getByText('Is this onset soft')).toHaveCount(0);
  await expect(visitor.getByRole('button', { name: 'Export', exact: true })).toHaveAttribute(
    'aria-disabled',
    'true',
  );
  await visitor.goto(ended);
  await expect(visitor.getByText(/opens nothing/)).toBeVisible();
});
