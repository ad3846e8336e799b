import { expect, test, type Browser, type Page } from '@playwright/test';

import { signInAs } from './sign-in';

/** A person at another machine. */
async function someone(browser: Browser): Promise<Page> {
  return (await browser.newContext({ viewport: { width: 1280, height: 900 } })).newPage();
}

/** Opens the newest message of a subject in the demo's mail. */
async function openMail(page: Page, subject: string | RegExp, to: string): Promise<void> {
  await page.goto('/mail');
  await page.getByRole('button', { name: subject }).filter({ hasText: to }).first().click();
  await expect(page.getByRole('article').getByRole('heading', { name: subject })).toBeVisible();
}

const memberOf = (page: Page, name: string) =>
  page
    .getByRole('region', { name: /members?$/ })
    .getByRole('listitem')
    .filter({ hasText: name });

/** Promise: a supervisor invites people, they join from the mail, get another role, and go without losing work. */
test('invite, accept from the mail, change of role, removal', async ({ page, browser }) => {
  await signInAs(page, 'Ada Fennimore');
  await page.goto('/lab');
  await page.getByRole('button', { name: 'New lab' }).click();
  await page.getByRole('textbox', { name: 'Name of the lab' }).fill('Heath group');
  await page.getByRole('button', { name: 'Make the lab' }).click();
  await expect(page.getByRole('heading', { name: 'Heath group', level: 1 })).toBeVisible();

  // A file with good rows and bad ones.
  await page.getByRole('button', { name: 'Invite people' }).click();
  const dialog = page.getByRole('dialog');
  await dialog.getByLabel('Read a CSV file').setInputFiles({
    name: 'people.csv',
    mimeType: 'text/csv',
    buffer: Buffer.from(
      'Name;Email;Role\n"Reed; Nell";nell@example.org;researcher\nOle;ole@example.org;\nNo one;no address;\n' +
        'Nell;NELL@example.org;student\nAda;supervisor@demo.invalid;\nPia;pia@example.org;professor\n',
    ),
  });
  await dialog.getByRole('button', { name: 'Look at the rows' }).click();
  const rows = dialog.getByRole('row');
  await expect(rows).toHaveCount(7);
  await expect(rows.nth(1)).toContainText(/nell@example.org\s*researcher\s*ready/);
  await expect(rows.nth(2)).toContainText(/ole@example.org\s*student\s*ready/);
  await expect(rows.nth(3)).toContainText('not an e-mail address');
  await expect(rows.nth(4)).toContainText('earlier row');
  await expect(rows.nth(5)).toContainText('a member already');
  await expect(rows.nth(6)).toContainText('no role');
  await dialog.getByRole('button', { name: 'Invite 2 people, leave out 4' }).click();
  const invitations = page.getByRole('region', { name: 'Invitations' });
  await expect(invitations.getByRole('status')).toHaveText('2 people were invited. 4 rows were left out.');
  await expect(invitations.getByRole('listitem')).toHaveCount(2);
  await expect(invitations.getByRole('listitem').first()).toContainText('mailed');
  await invitations.getByRole('button', { name: 'Withdraw the invitation of ole@example.org' }).click();
  await expect(invitations.getByRole('listitem')).toHaveCount(1);

  // Nell opens her mail, signs up by its link and is in.
  const nell = await someone(browser);
  await openMail(nell, /invites you to Heath group/, 'nell@example.org');
  await nell.getByRole('button', { name: 'HTML' }).click();
  await expect(nell.frameLocator('iframe').getByRole('link', { name: 'Read the invitation' })).toBeVisible();
  await nell.getByRole('button', { name: 'Plain text' }).click();
  await nell.getByRole('link', { name: /join\?token/ }).click();
  await expect(nell.getByRole('heading', { name: 'Join Heath group' })).toBeVisible();
  const invitationAddress = nell.url();
  await nell.getByRole('button', { name: 'Make an account' }).click();
  await nell.getByLabel('Name').fill('Nell Reed');
  await nell.getByLabel('Password').fill('moss and lichen');
  await nell.getByRole('button', { name: 'Make the account and join' }).click();
  await expect(nell.getByRole('heading', { name: 'Heath group', level: 1 })).toBeVisible();
  await expect(nell.getByText('You are a researcher here.')).toBeVisible();
  await expect(nell.getByRole('button', { name: 'Invite people' })).toHaveCount(0);

  // The link works once; Ole's was withdrawn.
  const visitor = await someone(browser);
  await visitor.goto(invitationAddress);
  await expect(visitor.getByRole('alert')).toContainText('accepted already');
  await openMail(visitor, /invites you to Heath group/, 'ole@example.org');
  await visitor.getByRole('link', { name: /join\?token/ }).click();
  await expect(visitor.getByRole('alert')).toContainText('withdrawn');

  // A change of role reaches her, and mail says so.
  await page.reload();
  await page.getByLabel('Role of Nell Reed').selectOption('student');
  await expect(page.getByText('Nell Reed is now a student.')).toBeVisible();
  await expect(page.getByLabel('Role of Ada Fennimore')).toBeDisabled();
  await nell.reload();
  await expect(nell.getByText('You are a student here.')).toBeVisible();
  await openMail(nell, /now a student in Heath group/, 'nell@example.org');
  await nell.getByRole('link', { name: /unsubscribe\?token/ }).click();
  await nell.getByRole('button', { name: 'Stop this mail' }).click();
  await expect(nell.getByRole('heading', { name: 'This mail is off' })).toBeVisible();
  await nell.getByRole('link', { name: 'All that is mailed to you' }).click();
  await expect(nell.getByLabel('Your place in a lab')).toHaveValue('off');

  // Removal says what it brings before it happens.
  await memberOf(page, 'Nell Reed').getByRole('button', { name: 'Remove Nell Reed' }).click();
  await expect(page.getByRole('dialog')).toContainText('can be invited again');
  await page.getByRole('dialog').getByRole('button', { name: 'Remove', exact: true }).click();
  await expect(memberOf(page, 'Nell Reed')).toHaveCount(0);
  await nell.goto('/lab');
  await expect(nell.getByRole('heading', { name: 'You are in no lab' })).toBeVisible();
});

test('someone with an account accepts under it, by another address once it is shown to be theirs', async ({
  page,
  browser,
}) => {
  await signInAs(page, 'Ada Fennimore');
  await page.goto('/lab');
  await page.getByRole('button', { name: 'New lab' }).click();
  await page.getByRole('textbox', { name: 'Name of the lab' }).fill('Bog group');
  await page.getByRole('button', { name: 'Make the lab' }).click();
  await page.getByRole('button', { name: 'Invite people' }).click();
  const dialog = page.getByRole('dialog');
  await dialog.getByLabel('Addresses').fill('student@demo.invalid\ncolm@work.example, collaborator');
  await dialog.getByRole('button', { name: 'Look at the rows' }).click();
  await dialog.getByRole('button', { name: 'Invite 2 people' }).click();
  await expect(page.getByText('2 people were invited.')).toBeVisible();

  const sanna = await someone(browser);
  await signInAs(sanna, 'Sanna Weldon');
  await sanna.goto('/lab');
  await sanna.getByRole('button', { name: 'Join Bog group' }).click();
  await expect(sanna.getByRole('heading', { name: 'Bog group', level: 1 })).toBeVisible();
  await sanna.getByRole('combobox', { name: 'Lab' }).selectOption({ label: 'Fen Lab (invented)' });
  await expect(sanna.getByRole('heading', { name: 'Fen Lab (invented)', level: 1 })).toBeVisible();

  const colm = await someone(browser);
  await signInAs(colm, 'Colm Lichfield');
  await openMail(colm, /invites you to Bog group/, 'colm@work.example');
  await colm.getByRole('link', { name: /join\?token/ }).click();
  await expect(colm.getByText(/you are signed in as collaborator@demo.invalid/)).toBeVisible();
  await colm.getByRole('button', { name: 'Mail me a link to confirm' }).click();
  await expect(colm.getByRole('status')).toContainText('on its way to colm@work.example');
  await openMail(colm, /Is this address yours/, 'colm@work.example');
  await colm.getByRole('link', { name: /join\?token/ }).click();
  await colm.getByRole('button', { name: 'Join Bog group' }).click();
  await expect(colm.getByText('You are a collaborator here.')).toBeVisible();

  // Leaving, and the only supervisor who cannot.
  await colm.getByRole('button', { name: 'Leave' }).click();
  await colm.getByRole('dialog').getByRole('button', { name: 'Leave the lab' }).click();
  await expect(colm.getByRole('heading', { name: 'Fen Lab (invented)', level: 1 })).toBeVisible();
  await page.getByRole('button', { name: 'Leave' }).click();
  await expect(page.getByRole('dialog')).toContainText('A lab always keeps a supervisor');
});
