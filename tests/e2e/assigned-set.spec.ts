import { expect, test, type Page } from '@playwright/test';

import { signInAs } from './sign-in';

interface Frozen {
  readonly document: unknown;
  readonly range: unknown;
  readonly wanted: readonly { readonly id: string; readonly kind: string }[];
  readonly reference: {
    readonly sweep: unknown;
    readonly findings: readonly { id: string; value: number | null }[];
  };
}

/** Calls the server as whoever is signed in on this page. */
async function call<T>(page: Page, method: string, path: string, body?: unknown): Promise<T> {
  return page.evaluate(
    async ([how, where, what]) => {
      const session = (await (await fetch('/api/session')).json()) as { csrfToken: string };
      const answer = await fetch(`/api${where}`, {
        method: how,
        headers: { 'content-type': 'application/json', 'x-csrf-token': session.csrfToken },
        ...(what ? { body: what } : {}),
      });
      if (!answer.ok) throw new Error(`${how} ${where}: ${answer.status} ${await answer.text()}`);
      return (await answer.json()) as T;
    },
    [method, path, body === undefined ? '' : JSON.stringify(body)] as const,
  );
}

const saved = (page: Page) => expect(page.getByRole('status').filter({ hasText: /^Saved$/ })).toBeVisible();

/** Promise: a supervisor sets a sweep whose reference their own run gives, and reviews what is handed in. */
test('set a sweep, compute its reference, open it, review a hand-in and give it back', async ({
  page,
  browser,
}) => {
  test.setTimeout(180_000);
  await signInAs(page, 'Ada Fennimore');
  await page.goto('/presets?kind=starter&search=midges');
  await page.getByRole('button', { name: 'More for Jumping spiders on midges, saturating, by sex' }).click();
  await page.getByRole('menuitem', { name: 'Set as an assigned sweep…' }).click();
  await page.getByRole('button', { name: 'Make the draft' }).click();
  await expect(page).toHaveURL(/\/assigned\/[^/]+\/set$/);
  const id = new URL(page.url()).pathname.split('/')[2] ?? '';

  const title = page.getByRole('textbox', { name: 'Title' });
  await title.fill('Onset of cycles under enrichment');
  await title.press('Enter');
  await page
    .getByRole('textbox', { name: 'Brief' })
    .fill('Raise $K$ and find where the **coexistence** loses its stability. <img src=x onerror=alert(1)>');
  const preview = page.getByRole('region', { name: 'Preview of the brief' });
  await expect(preview.locator('.katex').first()).toBeVisible();
  await expect(preview.locator('strong')).toHaveText('coexistence');
  await expect(preview.locator('img')).toHaveCount(0);

  await page.getByRole('combobox', { name: 'Parameter' }).selectOption('K');
  await page.getByRole('textbox', { name: 'From' }).fill('0.5');
  await page.getByRole('textbox', { name: 'From' }).press('Enter');
  await page.getByRole('textbox', { name: 'To', exact: true }).fill('2');
  await page.getByRole('textbox', { name: 'To', exact: true }).press('Enter');
  await page.getByRole('button', { name: 'Add a special point' }).click();
  await page.getByRole('button', { name: 'Add a reading' }).click();
  await page.getByRole('button', { name: 'Compute the reference' }).click();
  const hopf = page.getByRole('textbox', { name: 'Reference for Onset of cycles' });
  await expect(hopf).toHaveValue(/^\d/, { timeout: 60_000 });
  const references = page.getByRole('list', { name: 'Reference findings' });
  await references.getByRole('checkbox', { name: 'Confirmed' }).first().check();
  await page.getByLabel('Date and time').fill('2031-01-15T17:00');
  await page.getByRole('combobox', { name: 'Time zone' }).selectOption('Europe/Lisbon');
  await page.getByRole('textbox', { name: 'Search people' }).fill('Sanna');
  await page.getByRole('checkbox', { name: 'Sanna Weldon' }).check();
  await saved(page);
  await expect(page.getByText('Before it can be opened')).toHaveCount(0);
  await page.reload();
  await expect(title).toHaveValue('Onset of cycles under enrichment');
  await expect(page.getByLabel('Date and time')).toHaveValue('2031-01-15T17:00');
  await page.getByRole('button', { name: 'Open', exact: true }).click();
  await expect(page.getByRole('button', { name: 'Close', exact: true })).toBeVisible();
  await expect(page.getByRole('combobox', { name: 'Parameter' })).toBeDisabled();

  // Sanna hands in what she found: the reference, a little off.
  const reference = await call<Frozen>(page, 'GET', `/assigned/${id}`);
  const student = await (await browser.newContext()).newPage();
  await signInAs(student, 'Sanna Weldon');
  await expect(student.getByRole('region', { name: 'Assigned to you' })).toContainText('Onset of cycles');
  const task = await call<Frozen>(student, 'GET', `/assigned/${id}/task`);
  const value = reference.reference.findings.find((one) => one.value !== null)?.value ?? 0;
  await call(student, 'POST', `/assigned/${id}/hand-ins`, {
    key: crypto.randomUUID(),
    document: task.document,
    range: task.range,
    findings: task.wanted.map((one) =>
      one.kind === 'special point'
        ? { id: one.id, value: value * 1.03, text: '', pin: null }
        : { id: one.id, value: null, text: 'Cycles grow from a soft onset.', pin: null },
    ),
    sweep: reference.reference.sweep,
    note: 'Done twice.',
  });

  // The table: what is proposed follows the tolerance.
  await page.goto(`/assigned/${id}/review`);
  const row = page.getByRole('row').filter({ hasText: 'Sanna Weldon' });
  await expect(row).toContainText('sent');
  await expect(row).toContainText('proposed: differs');
  const tolerance = page.getByRole('textbox', { name: 'Tolerance of Onset of cycles' });
  await tolerance.fill('5');
  await tolerance.press('Enter');
  await expect(row).toContainText('proposed: agrees');
  const [file] = await Promise.all([
    page.waitForEvent('download'),
    page.getByRole('link', { name: 'Download as CSV' }).click(),
  ]);
  expect(file.suggestedFilename()).toMatch(/\.csv$/);

  // One hand-in: decision, remarks, replay.
  await row.getByRole('link', { name: 'Sanna Weldon' }).click();
  await expect(page.getByRole('heading', { name: 'Sanna Weldon, hand-in 1' })).toBeVisible();
  await page.getByRole('button', { name: 'Take over what is proposed' }).click();
  await expect(
    page.getByRole('group', { name: 'Decision on Onset of cycles' }).getByRole('button', { name: 'agrees' }),
  ).toHaveAttribute('aria-pressed', 'true');
  await page.getByRole('button', { name: 'Remark on Onset of cycles' }).click();
  await page.getByRole('textbox', { name: 'Remark on Onset of cycles' }).fill('Three per cent off.');
  await page.getByRole('button', { name: 'Add the remark' }).click();
  const choice = page.getByRole('combobox', { name: 'Pin a remark at a special point' });
  await choice.selectOption(
    await choice.locator('option', { hasText: 'theirs: Hopf' }).first().getAttribute('value'),
  );
  await page.getByRole('textbox', { name: /^Remark at K = / }).fill('Here it begins.');
  await page.getByRole('button', { name: 'Add the remark' }).click();
  await expect(page.getByRole('button', { name: 'Remark 1 in the plot: Here it begins.' })).toBeVisible();
  await page.getByRole('button', { name: 'Replay the sweep' }).click();
  await expect(page.getByText(/special points? comes? out again|special points come out again/)).toBeVisible({
    timeout: 60_000,
  });
  await page.getByRole('textbox', { name: 'Note to Sanna Weldon' }).fill('Well found.');
  await saved(page);
  await page.reload();
  await expect(page.getByRole('textbox', { name: 'Note to Sanna Weldon' })).toHaveValue('Well found.');
  await page.getByRole('button', { name: 'Give back: agreed' }).click();
  await expect(page.getByText(/Given back as agreed by Ada Fennimore/)).toBeVisible();
  await student.goto(`/assigned/${id}`);
  await expect(student.getByRole('article', { name: 'Hand-in 1' })).toContainText('Well found.');
  await expect(student.getByRole('article', { name: 'Hand-in 1' })).toContainText('Three per cent off.');

  // Sent back from the table, and the sweep set again for others.
  await page.goto(`/assigned/${id}/review`);
  await page.getByRole('checkbox', { name: 'Choose Sanna Weldon' }).check();
  await page.getByRole('button', { name: 'Send 1 back…' }).click();
  await page.getByRole('textbox', { name: 'What is asked of them' }).fill('Once more, with a finer range.');
  await page.getByRole('dialog').getByRole('button', { name: 'Send back' }).click();
  await expect(page.getByText('Sent back to 1 person.')).toBeVisible();
  await expect(row).toContainText('sent back');
  await page.getByRole('link', { name: 'Edit the sweep' }).click();
  await page.getByRole('button', { name: 'Set again for others' }).click();
  await expect(page.getByText('Nobody is chosen whom it is for.')).toBeVisible();
  await expect(page.getByRole('textbox', { name: 'Title' })).toHaveValue('Onset of cycles under enrichment');
  await page.getByRole('button', { name: 'Delete the draft' }).click();
  await page.getByRole('dialog').getByRole('button', { name: 'Delete', exact: true }).click();
  await expect(page.getByRole('heading', { name: 'Assigned sweeps' })).toBeVisible();
  await expect(page.getByRole('listitem').filter({ hasText: 'Onset of cycles' })).toHaveCount(1);
});
