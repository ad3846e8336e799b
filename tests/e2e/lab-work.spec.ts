import { expect, test, type Browser, type Page } from '@playwright/test';

import { signInAs } from './sign-in';

/** A person at another machine. */
async function someone(browser: Browser): Promise<Page> {
  return (await browser.newContext({ viewport: { width: 1440, height: 900 } })).newPage();
}

/** The newest message to an address whose subject matches, opened; the page shows it as plain text. */
async function openMail(page: Page, subject: RegExp, to: string): Promise<void> {
  await expect(async () => {
    await page.goto('/mail');
    await page
      .getByRole('button', { name: subject })
      .filter({ hasText: to })
      .first()
      .click({ timeout: 2_000 });
  }).toPass({ timeout: 20_000 });
}

/** Accepts an invitation from the mail with a new account. */
async function joinFromMail(page: Page, address: string, name: string): Promise<void> {
  await openMail(page, /invites you to/, address);
  await page.getByRole('link', { name: /join\?token/ }).click();
  await page.getByRole('button', { name: 'Make an account' }).click();
  await page.getByLabel('Name').fill(name);
  await page.getByLabel('Password').fill('reed and rush');
  await page.getByRole('button', { name: 'Make the account and join' }).click();
  await expect(page.getByText('You are a student here.')).toBeVisible();
}

const card = (page: Page) => page.getByRole('region', { name: 'Assigned sweep' });

/** Opens the work of a task from its page and waits for the sweep. */
async function openWork(page: Page, id: string): Promise<void> {
  await page.goto(`/assigned/${id}`);
  await page.getByRole('link', { name: /workbench/ }).click();
  await expect(card(page)).toBeVisible();
  await expect(page.getByRole('region', { name: 'Special points' }).getByText('Hopf').first()).toBeVisible({
    timeout: 60_000,
  });
}

async function handIn(page: Page): Promise<void> {
  await card(page).getByRole('button', { name: 'Hand in…' }).click();
  const dialog = page.getByRole('dialog');
  await expect(dialog.getByText('The sweep on show goes with it.')).toBeVisible({ timeout: 30_000 });
  await dialog.getByRole('button', { name: 'Hand in', exact: true }).click();
}

/** Promise: three people at once do a piece of lab work from invitation to agreement; a visitor sees a link alone. */
test('invite, set, work through a lost connection, hand in on time and late, review, send back, agree', async ({
  page: ada,
  browser,
}) => {
  test.setTimeout(360_000);

  // Ada founds a lab and invites two students.
  await signInAs(ada, 'Ada Fennimore');
  await ada.goto('/lab');
  await ada.getByRole('button', { name: 'New lab' }).click();
  await ada.getByRole('textbox', { name: 'Name of the lab' }).fill('Carr group');
  await ada.getByRole('button', { name: 'Make the lab' }).click();
  await expect(ada.getByRole('heading', { name: 'Carr group', level: 1 })).toBeVisible();
  await ada.getByRole('button', { name: 'Invite people' }).click();
  const invite = ada.getByRole('dialog');
  await invite.getByRole('textbox').first().fill('iris@example.org\nosk@example.org');
  await invite.getByRole('button', { name: 'Look at the rows' }).click();
  await invite.getByRole('button', { name: 'Invite 2 people' }).click();
  await expect(ada.getByRole('region', { name: 'Invitations' }).getByRole('listitem')).toHaveCount(2);

  // Both accept from the mail.
  const [iris, osk] = [await someone(browser), await someone(browser)];
  await joinFromMail(iris, 'iris@example.org', 'Iris Carr');
  await joinFromMail(osk, 'osk@example.org', 'Osk Sallow');

  // Ada sets a sweep with a reference of her own run.
  await ada.goto('/presets?kind=starter&search=midges');
  await ada.getByRole('button', { name: 'More for Jumping spiders on midges, saturating, by sex' }).click();
  await ada.getByRole('menuitem', { name: 'Set as an assigned sweep…' }).click();
  const lab = ada.getByRole('dialog').getByRole('combobox');
  if ((await lab.count()) > 0) await lab.first().selectOption({ label: 'Carr group' });
  await ada.getByRole('button', { name: 'Make the draft' }).click();
  await expect(ada).toHaveURL(/\/assigned\/[^/]+\/set$/);
  const id = new URL(ada.url()).pathname.split('/')[2] ?? '';
  await ada.getByRole('textbox', { name: 'Title' }).fill('Cycles under enrichment');
  await ada.getByRole('textbox', { name: 'Title' }).press('Enter');
  await ada.getByRole('textbox', { name: 'Brief' }).fill('Raise $K$ until the coexistence starts to cycle.');
  await ada.getByRole('combobox', { name: 'Parameter' }).selectOption('K');
  for (const [end, value] of [
    ['From', '0.5'],
    ['To', '2'],
  ] as const) {
    await ada.getByRole('textbox', { name: end, exact: true }).fill(value);
    await ada.getByRole('textbox', { name: end, exact: true }).press('Enter');
  }
  await ada.getByRole('button', { name: 'Add a special point' }).click();
  await ada.getByRole('button', { name: 'Add a reading' }).click();
  await ada.getByRole('button', { name: 'Compute the reference' }).click();
  const expected = ada.getByRole('textbox', { name: 'Reference for Onset of cycles' });
  await expect(expected).toHaveValue(/^\d/, { timeout: 60_000 });
  const reference = Number(await expected.inputValue());
  await ada.getByRole('list', { name: 'Reference findings' }).getByRole('checkbox').first().check();
  await ada.getByRole('combobox', { name: 'Time zone' }).selectOption('UTC');
  await ada.getByLabel('Date and time').fill(new Date(Date.now() + 86_400_000).toISOString().slice(0, 16));
  for (const name of ['Iris Carr', 'Osk Sallow']) await ada.getByRole('checkbox', { name }).check();
  await expect(ada.getByRole('status').filter({ hasText: /^Saved$/ })).toBeVisible();
  await ada.getByRole('button', { name: 'Open', exact: true }).click();
  await expect(ada.getByRole('button', { name: 'Close', exact: true })).toBeVisible();

  // Iris learns of it by mail and on her desk; nothing that reaches her browser holds the answer.
  const heard: string[] = [];
  iris.on('response', (response) => {
    if (!response.url().includes('/api/')) return;
    void response.text().then(
      (text) => heard.push(text),
      () => undefined,
    );
  });
  await openMail(iris, /A sweep for you: Cycles under enrichment/, 'iris@example.org');
  await iris.goto('/');
  await expect(iris.getByRole('region', { name: 'Assigned to you' })).toContainText(
    'Cycles under enrichment',
  );
  await openWork(iris, id);
  expect(heard.some((text) => text.includes(String(reference)) || /"knownFacts":\[\{/.test(text))).toBe(
    false,
  );

  // What is locked is locked; the finding is pinned with one press.
  await expect(iris.getByRole('textbox', { name: 'growth of midges, value' })).toBeDisabled();
  await expect(iris.getByRole('textbox', { name: 'from' })).toHaveAttribute('readonly', '');
  await iris
    .getByRole('button', { name: /^Pin as “Onset of cycles”/ })
    .first()
    .click();
  await expect(card(iris)).toContainText('pinned: Hopf, split');
  await expect(card(iris)).toContainText('All of it is saved.');

  // The connection goes; the work and a closed tab lose nothing.
  await iris.context().setOffline(true);
  await card(iris)
    .getByRole('textbox', { name: 'What you read in it' })
    .fill('Cycles grow softly from the coexistence.');
  await expect(card(iris)).toContainText('No connection. Your work is kept in this browser');
  await iris.close();
  const irisAgain = await (async () => {
    const next = await iris.context().newPage();
    await iris.context().setOffline(false);
    return next;
  })();
  await openWork(irisAgain, id);
  await expect(card(irisAgain).getByRole('textbox', { name: 'What you read in it' })).toHaveValue(
    'Cycles grow softly from the coexistence.',
  );
  await expect(card(irisAgain)).toContainText('All of it is saved.');

  // Handed in on time, the answer of the server lost on the way: it is sent again by itself, once.
  await irisAgain.route(
    '**/api/assigned/*/hand-ins',
    async (route) => {
      await route.fetch();
      await route.abort('connectionreset');
    },
    { times: 1 },
  );
  await handIn(irisAgain);
  await expect(irisAgain.getByRole('dialog')).toContainText('There is no connection. The hand-in is kept');
  await expect(irisAgain.getByText(/The hand-in that waited was received as number 1\./)).toBeVisible({
    timeout: 30_000,
  });
  await irisAgain.getByRole('button', { name: 'Cancel' }).click();

  // The due date is moved to now; Osk is late and far off.
  await ada.evaluate(async (sweep) => {
    const { csrfToken } = (await (await fetch('/api/session')).json()) as { csrfToken: string };
    const { revision } = (await (await fetch(`/api/assigned/${sweep}`)).json()) as { revision: number };
    const answer = await fetch(`/api/assigned/${sweep}`, {
      method: 'PATCH',
      headers: { 'content-type': 'application/json', 'x-csrf-token': csrfToken },
      body: JSON.stringify({ baseRevision: revision, dueAt: new Date().toISOString() }),
    });
    if (!answer.ok) throw new Error(await answer.text());
  }, id);
  await openWork(osk, id);
  const value = card(osk).getByRole('textbox', { name: 'Value of “Onset of cycles”' });
  await value.fill(String(2 * reference));
  await value.press('Enter');
  await expect(card(osk)).toContainText('typed');
  await handIn(osk);
  await expect(osk.getByRole('dialog')).toContainText('Hand-in 1 was received');
  await expect(osk.getByRole('dialog')).toContainText('after the due date');
  await openMail(await someone(browser), /Received: Cycles under enrichment/, 'osk@example.org');

  // Ada sees both, agrees with Iris and sends Osk's back.
  await ada.goto(`/assigned/${id}/review`);
  const rowOf = (name: string) => ada.getByRole('row').filter({ hasText: name });
  await expect(rowOf('Iris Carr')).toContainText('proposed: agrees');
  await expect(rowOf('Osk Sallow')).toContainText('proposed: differs');
  await expect(rowOf('Osk Sallow')).toContainText('late');
  await rowOf('Iris Carr').getByRole('link', { name: 'Iris Carr' }).click();
  await ada.getByRole('button', { name: 'Take over what is proposed' }).click();
  await ada.getByRole('button', { name: 'Replay the sweep' }).click();
  await expect(ada.getByText(/come out again|comes out again/)).toBeVisible({ timeout: 60_000 });
  await ada.getByRole('button', { name: 'Give back: agreed' }).click();
  await expect(ada.getByText(/Given back as agreed/)).toBeVisible();
  await ada.goto(`/assigned/${id}/review`);
  await ada.getByRole('checkbox', { name: 'Choose Osk Sallow' }).check();
  await ada.getByRole('button', { name: 'Send 1 back…' }).click();
  await ada
    .getByRole('textbox', { name: 'What is asked of them' })
    .fill('Pin the point instead of typing it.');
  await ada.getByRole('dialog').getByRole('button', { name: 'Send back' }).click();
  await expect(rowOf('Osk Sallow')).toContainText('sent back');

  // Osk reads why, does it again, and it agrees.
  await openMail(osk, /Sent back: Cycles under enrichment/, 'osk@example.org');
  await openWork(osk, id);
  await expect(card(osk)).toContainText('Pin the point instead of typing it.');
  await osk
    .getByRole('button', { name: /^Pin as “Onset of cycles”/ })
    .first()
    .click();
  await handIn(osk);
  await expect(osk.getByRole('dialog')).toContainText('Hand-in 2 was received');
  await ada.goto(`/assigned/${id}/review`);
  await expect(rowOf('Osk Sallow')).toContainText('proposed: agrees');
  await rowOf('Osk Sallow').getByRole('link', { name: 'Osk Sallow' }).click();
  await expect(ada.getByRole('heading', { name: 'Osk Sallow, hand-in 2' })).toBeVisible();
  await ada.getByRole('button', { name: 'Take over what is proposed' }).click();
  await ada.getByRole('button', { name: 'Give back: agreed' }).click();
  await expect(ada.getByText(/Given back as agreed/)).toBeVisible();

  // The export says so; neither student reaches the other's work.
  await ada.goto(`/assigned/${id}/review`);
  const [file] = await Promise.all([
    ada.waitForEvent('download'),
    ada.getByRole('link', { name: 'Download as CSV' }).click(),
  ]);
  const csv = await (await file.createReadStream()).toArray();
  expect(Buffer.concat(csv as Buffer[]).toString()).toMatch(/Osk Sallow[^\n]*agreed/);
  await rowOf('Iris Carr').getByRole('link', { name: 'Iris Carr' }).click();
  const theirs = new URL(ada.url()).pathname;
  await osk.goto(theirs);
  await expect(osk.getByText(/nothing at this address|not shared with you/)).toBeVisible();
  await osk.goto(`/assigned/${id}/review`);
  await expect(osk.getByText(/does not let you|nothing at this address/)).toBeVisible();

  // A visitor sees what a link opens, and nothing else.
  const address = await ada.evaluate(async () => {
    const { csrfToken } = (await (await fetch('/api/session')).json()) as { csrfToken: string };
    const post = async (path: string, body: unknown) => {
      const headers = { 'content-type': 'application/json', 'x-csrf-token': csrfToken };
      const answer = await fetch(`/api${path}`, { method: 'POST', headers, body: JSON.stringify(body) });
      return (await answer.json()) as { preset?: { id: string }; url?: string };
    };
    const copy = await post('/presets/starter-saturating-two-sex-predator/duplicate', {});
    return (await post(`/presets/${copy.preset?.id ?? ''}/links`, { label: 'for a visitor' })).url ?? '';
  });
  const visitor = await someone(browser);
  await visitor.goto(address);
  await expect(visitor.getByText('Explore freely; nothing is saved.')).toBeVisible({ timeout: 30_000 });
  await visitor.goto(`/assigned/${id}`);
  await expect(visitor.getByRole('heading', { name: /Sign in/ })).toBeVisible();
});
