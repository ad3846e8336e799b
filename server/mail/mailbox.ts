import { createHash } from 'node:crypto';
import { mkdir, readdir, readFile, rename, writeFile } from 'node:fs/promises';
import { join } from 'node:path';

import { simpleParser, type AddressObject } from 'mailparser';

export interface StoredMail {
  id: string;
  from: string;
  to: string;
  subject: string;
  receivedAt: Date;
  text: string;
  /** As it was sent; for a frame in which nothing runs. */
  html: string;
  unsubscribeUrl: string | null;
}

const FILE_NAME = /^(\d{13}-[A-Za-z0-9_-]{16})\.eml$/;
const NEWEST = 200;

const addressText = (address: AddressObject | AddressObject[] | undefined): string =>
  (Array.isArray(address) ? address : address === undefined ? [] : [address])
    .map((entry) => entry.text)
    .join(', ');

/** Names a message by its Message-ID, so that one handed over twice is kept once. */
function nameOf(source: Buffer): string {
  const head = source.toString('latin1').split(/\r?\n\r?\n/, 1)[0] ?? '';
  const messageId = /^message-id:\s*(<[^>]+>)/im.exec(head)?.[1];
  return createHash('sha256')
    .update(messageId ?? source)
    .digest('base64url')
    .slice(0, 16);
}

/** Messages taken by the local mail server, one `.eml` file each, named by the time of arrival. */
export class Mailbox {
  constructor(readonly folder: string) {}

  async store(source: Buffer): Promise<void> {
    await mkdir(this.folder, { recursive: true, mode: 0o700 });
    const name = nameOf(source);
    if ((await this.fileNames()).some((id) => id.endsWith(`-${name}`))) return;
    const id = `${String(Date.now()).padStart(13, '0')}-${name}`;
    const draft = join(this.folder, `${id}.part`);
    await writeFile(draft, source, { mode: 0o600 });
    await rename(draft, join(this.folder, `${id}.eml`));
  }

  /** The newest messages, newest first. */
  async list(): Promise<StoredMail[]> {
    const ids = (await this.fileNames()).sort().reverse().slice(0, NEWEST);
    const messages = await Promise.all(ids.map((id) => this.read(id)));
    return messages.filter((message) => message !== null);
  }

  /** One message, or null where there is none of this name. */
  async read(id: string): Promise<StoredMail | null> {
    // Only a name found in the folder is opened, so no path can be smuggled in.
    if (!(await this.fileNames()).includes(id)) return null;
    const parsed = await simpleParser(await readFile(join(this.folder, `${id}.eml`)));
    return {
      id,
      from: addressText(parsed.from),
      to: addressText(parsed.to),
      subject: parsed.subject ?? '',
      receivedAt: new Date(Number(id.slice(0, 13))),
      text: parsed.text ?? '',
      html: parsed.html || '',
      unsubscribeUrl:
        parsed.headerLines.find(({ key }) => key === 'list-unsubscribe')?.line.match(/<([^>]+)>/)?.[1] ??
        null,
    };
  }

  private async fileNames(): Promise<string[]> {
    const names = await readdir(this.folder).catch((error: NodeJS.ErrnoException) => {
      if (error.code === 'ENOENT') return [];
      throw error;
    });
    return names.flatMap((name) => FILE_NAME.exec(name)?.[1] ?? []);
  }
}
