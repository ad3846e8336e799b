import { createHmac, timingSafeEqual } from 'node:crypto';

import { MAIL_KIND_NAMES, type MailScope } from '@/contract/mail';

import { refuseBadToken } from '../errors';

export interface Subscription {
  readonly address: string;
  readonly scope: MailScope;
}

const sign = (payload: string, secret: string) =>
  createHmac('sha256', secret).update(`unsubscribe ${payload}`).digest('base64url');

/** Proof that a link went to an address: it needs no session, opens nothing but this, and does not expire. */
export function makeUnsubscribeToken({ address, scope }: Subscription, secret: string): string {
  const payload = Buffer.from(JSON.stringify([address, scope])).toString('base64url');
  return `${payload}.${sign(payload, secret)}`;
}

export function readUnsubscribeToken(token: string, secret: string): Subscription {
  const refusal = refuseBadToken(
    'This link is incomplete, so nothing was changed. Open it from the message again, or change your mail on the account page.',
  );
  const [payload = '', signature = '', ...rest] = token.split('.');
  const given = Buffer.from(signature);
  const right = Buffer.from(sign(payload, secret));
  if (rest.length > 0 || given.length !== right.length || !timingSafeEqual(given, right)) throw refusal;
  const [address, scope] = JSON.parse(Buffer.from(payload, 'base64url').toString()) as [string, MailScope];
  if (scope !== 'all' && !MAIL_KIND_NAMES.includes(scope)) throw refusal;
  return { address, scope };
}
