import { mkdtempSync, rmSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';

import { simpleParser } from 'mailparser';
import { afterEach, beforeEach, describe, expect, it, vi } from 'vitest';

import { createLogger } from '../../server/logger';
import { claimMail, LEASE } from '../../server/mail/claim-mail';
import { nextStrike } from '../../server/mail/digest-time';
import { changeMailSettings } from '../../server/mail/mail-settings';
import { Mailbox } from '../../server/mail/mailbox';
import { Mailer, pauseAfter } from '../../server/mail/mailer';
import { queueMail, type NewMail } from '../../server/mail/queue-mail';
import { createMigrator } from '../../server/migrations';
import { Database } from '../../server/models/database';
import { startFakeSmtp, type FakeSmtp } from '../support/fake-smtp';

let folder: string;
let database: Database;
let smtp: FakeSmtp;
let mailer: Mailer;

const makeMailer = () =>
  new Mailer(
    database,
    {
      smtpUrl: smtp.url,
      from: 'Moiety <post@moiety.test>',
      publicUrl: 'http://moiety.test',
      secret: 's'.repeat(40),
    },
    createLogger('silent'),
  );

beforeEach(async () => {
  folder = mkdtempSync(join(tmpdir(), 'moiety-mail-'));
  database = new Database(join(folder, 'moiety.sqlite'));
  await createMigrator(database).up();
  smtp = await startFakeSmtp();
  mailer = makeMailer();
});
afterEach(async () => {
  await mailer.stop();
  await smtp.close();
  await database.close();
  rmSync(folder, { recursive: true, force: true });
});

function queue(mail: Partial<NewMail> & { key: string }, through: Mailer = mailer) {
  const content = { subject: mail.key, name: 'Nia', passages: [{ text: 'Something happened.' }] };
  return database.change((transaction) =>
    queueMail({ database, mailer: through }, transaction, {
      to: 'nia@example.org',
      kind: 'account',
      content,
      ...mail,
    }),
  );
}

const states = async () =>
  (await database.models.MailMessage.findAll({ order: [['createdAt', 'ASC']] })).map(({ state }) => state);
const makeDue = () =>
  database.models.MailMessage.update({ dueAt: new Date() }, { where: { state: 'waiting' } });
const asleep = () => ({ wake: () => undefined }) as Mailer;

describe('a message', () => {
  it('goes out as text and HTML, with what people wrote escaped, and its content is forgotten', async () => {
    await queue({
      key: 'one',
      content: {
        subject: 'Newts\r\nBcc: all@example.org',
        name: '<b>Nia</b>',
        passages: [{ text: 'a < b & "c"' }, { label: 'Open', url: 'http://moiety.test/x?a=1&b=2' }],
      },
    });
    await mailer.idle();
    const mail = await simpleParser(smtp.taken[0] ?? '');
    expect(mail.subject).toBe('Newts Bcc: all@example.org');
    expect(mail.headers.has('bcc')).toBe(false);
    expect(mail.text).toContain('Open:\nhttp://moiety.test/x?a=1&b=2');
    expect(mail.html).toContain('a &lt; b &amp; &quot;c&quot;');
    expect(mail.html).toContain('&lt;b&gt;Nia&lt;/b&gt;');
    expect(mail.html).not.toContain('<b>');
    const [row] = await database.models.MailMessage.findAll();
    expect([row?.state, row?.content]).toEqual(['sent', null]);
  });

  it('of the same name is made and sent once', async () => {
    await Promise.all([queue({ key: 'same' }), queue({ key: 'same' }), queue({ key: 'same' })]);
    await mailer.idle();
    expect(smtp.taken).toHaveLength(1);
  });

  it('is not made when its change is undone', async () => {
    const change = database.change(async (transaction) => {
      const content = { subject: 'x', name: '', passages: [] };
      await queueMail({ database, mailer }, transaction, {
        to: 'a@b.org',
        kind: 'account',
        content,
        key: 'x',
      });
      throw new Error('undone');
    });
    await expect(change).rejects.toThrow('undone');
    await mailer.idle();
    expect([await states(), smtp.taken]).toEqual([[], []]);
  });

  it('waits while the server is busy, longer each time, and keeps its Message-ID', async () => {
    smtp.moods.push('busy', 'busy');
    const pauses: number[] = [];
    await queue({ key: 'patience' });
    for (let attempt = 0; attempt < 2; attempt += 1) {
      await mailer.idle();
      const [row] = await database.models.MailMessage.findAll();
      pauses.push((row?.dueAt.getTime() ?? 0) - Date.now());
      expect([row?.state, row?.lastError]).toEqual(['waiting', expect.stringContaining('Try again later')]);
      await makeDue();
      mailer.wake();
    }
    await mailer.idle();
    expect([await states(), smtp.attempts()]).toEqual([['sent'], 3]);
    expect(pauses[0]).toBeGreaterThan(20_000);
    expect(pauses[1]).toBeGreaterThan(45_000);
    const [row] = await database.models.MailMessage.findAll();
    expect((await simpleParser(smtp.taken[0] ?? '')).messageId).toBe(`<${row?.id}@moiety.test>`);
  });

  it('is given up at once when it is refused for good, and after many attempts otherwise', async () => {
    smtp.moods.push('refuse');
    await queue({ key: 'refused' });
    await mailer.idle();
    expect([await states(), smtp.attempts()]).toEqual([['given up'], 1]);
    smtp.moods.push(...Array<'busy'>(20).fill('busy'));
    await queue({ key: 'never' });
    for (let k = 0; k < 16; k += 1) {
      await makeDue();
      mailer.wake();
      await mailer.idle();
    }
    expect([await states(), smtp.attempts()]).toEqual([['given up', 'given up'], 16]);
  });

  it('is not sent once its link has expired', async () => {
    await queue({ key: 'late', expiresAt: new Date(Date.now() - 1) });
    await mailer.idle();
    expect([await states(), smtp.taken]).toEqual([['too late'], []]);
  });
});

describe('once, whatever ends', () => {
  it('is sent by one of several processes that look at the same moment', async () => {
    const others = [makeMailer(), makeMailer()];
    for (let k = 0; k < 12; k += 1) await queue({ key: `many ${k}`, to: `p${k}@example.org` }, asleep());
    for (const one of [mailer, ...others]) one.wake();
    await Promise.all([mailer, ...others].map((one) => one.idle()));
    expect(smtp.taken).toHaveLength(12);
    expect(new Set(await states())).toEqual(new Set(['sent']));
    for (const one of others) await one.stop();
  });

  it('is left alone while claimed, and taken over when the claiming process died', async () => {
    await queue({ key: 'orphan' }, asleep());
    const died = await claimMail(database);
    mailer.wake();
    await mailer.idle();
    expect(smtp.taken).toHaveLength(0);
    const later = await claimMail(database, new Date(Date.now() + LEASE + 1));
    expect(later?.messages[0].id).toBe(died?.messages[0].id);
    expect(later?.claim).not.toBe(died?.claim);
  });

  it('stops with what it claimed handed over and the rest left for the next start', async () => {
    smtp.moods.push('wait', 'wait', 'wait');
    for (let k = 0; k < 5; k += 1) await queue({ key: `slow ${k}`, to: `p${k}@example.org` }, asleep());
    mailer.wake();
    await vi.waitFor(() => expect(smtp.attempts()).toBe(3), { timeout: 5_000 });
    const stopped = mailer.stop();
    smtp.release();
    await stopped;
    expect(smtp.taken).toHaveLength(3);
    expect((await states()).sort()).toEqual(['sent', 'sent', 'sent', 'waiting', 'waiting']);
    mailer = makeMailer();
    mailer.wake();
    await mailer.idle();
    expect(smtp.taken).toHaveLength(5);
  });

  it('is kept once in the local mailbox though it arrives twice', async () => {
    const mailbox = new Mailbox(join(folder, 'mail'));
    const source = Buffer.from('Message-ID: <a@moiety.test>\r\nSubject: Once\r\n\r\nHello');
    await mailbox.store(source);
    await mailbox.store(source);
    expect(await mailbox.list()).toHaveLength(1);
  });
});

describe('what people choose', () => {
  const turn = (timing: 'at once' | 'daily' | 'off') =>
    changeMailSettings(database, 'Nia@example.org', { timings: { membership: timing } });

  it('is not sent when turned off, even while it waited; mail about the account always is', async () => {
    await queue({ key: 'news', kind: 'membership' }, asleep());
    await turn('off');
    await queue({ key: 'account' });
    await mailer.idle();
    expect(smtp.taken).toHaveLength(1);
    expect((await states()).sort()).toEqual(['sent', 'withheld']);
    const mail = await simpleParser(smtp.taken[0] ?? '');
    expect(mail.subject).toBe('account');
    expect(mail.headers.has('list')).toBe(false);
  });

  it('goes out once a day as one message, with one-click headers', async () => {
    await turn('daily');
    for (const key of ['first', 'second', 'third']) await queue({ key, kind: 'membership' });
    await mailer.idle();
    expect(smtp.taken).toHaveLength(0);
    const [row] = await database.models.MailMessage.findAll();
    expect(row?.dueAt.toISOString()).toMatch(/T07:00:00.000Z$/);
    smtp.moods.push('busy');
    for (let attempt = 0; attempt < 2; attempt += 1) {
      await makeDue();
      mailer.wake();
      await mailer.idle();
      // What comes after the first attempt is another message.
      if (attempt === 0) await queue({ key: 'fourth', kind: 'membership' });
    }
    expect(smtp.taken).toHaveLength(2);
    const bundle = await simpleParser(smtp.taken.find((one) => one.includes('3 pieces of news')) ?? '');
    for (const key of ['first', 'second', 'third']) expect(bundle.text).toContain(key);
    expect(bundle.text).not.toContain('fourth');
    const raw = smtp.taken[0] ?? '';
    expect(raw).toMatch(/^List-Unsubscribe-Post: List-Unsubscribe=One-Click\r$/m);
    expect(raw.replace(/\r\n\s+/g, ' ')).toMatch(
      /^List-Unsubscribe: <http:\/\/moiety.test\/api\/mail\/unsubscribe\?token=[\w.-]+>/m,
    );
  });

  it('bundles what comes thick and fast', async () => {
    for (let k = 0; k < 3; k += 1) {
      await queue({ key: `early ${k}`, kind: 'membership' });
      await mailer.idle();
    }
    for (let k = 0; k < 5; k += 1) await queue({ key: `more ${k}`, kind: 'membership' });
    await mailer.idle();
    expect(smtp.taken).toHaveLength(3);
    await makeDue();
    mailer.wake();
    await mailer.idle();
    expect(smtp.taken).toHaveLength(4);
    expect((await simpleParser(smtp.taken[3] ?? '')).subject).toBe('5 pieces of news from Moiety');
  });
});

describe('clocks', () => {
  it.each([
    ['2026-06-01T05:30:00Z', 7, 'UTC', '2026-06-01T07:00:00.000Z'],
    ['2026-06-01T07:00:00Z', 7, 'UTC', '2026-06-02T07:00:00.000Z'],
    ['2026-06-01T05:30:00Z', 7, 'Asia/Kolkata', '2026-06-02T01:30:00.000Z'],
    ['2026-06-01T05:30:00Z', 7, 'Asia/Kathmandu', '2026-06-02T01:15:00.000Z'],
    // Clocks go back at 01:00 UTC on 25 October 2026 in Berlin: 07:00 is 06:00 UTC from then on.
    ['2026-10-24T12:00:00Z', 7, 'Europe/Berlin', '2026-10-25T06:00:00.000Z'],
    // Two o'clock is left out on 29 March 2026.
    ['2026-03-28T12:00:00Z', 2, 'Europe/Berlin', '2026-03-30T00:00:00.000Z'],
  ])('after %s strike %i in %s at %s', (now, hour, zone, expected) => {
    expect(nextStrike(new Date(now), hour, zone).toISOString()).toBe(expected);
  });

  it('pauses double up to six hours, spread by a fifth', () => {
    expect([1, 2, 3].map((attempt) => pauseAfter(attempt, 0.5))).toEqual([30_000, 60_000, 120_000]);
    expect(pauseAfter(15, 0.5)).toBe(6 * 60 * 60_000);
    expect([pauseAfter(1, 0), pauseAfter(1, 1)]).toEqual([24_000, 36_000]);
  });
});
