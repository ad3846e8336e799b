import type { ErrorBody } from '@/contract/errors';

export type RefusalCode = ErrorBody['error']['code'];
type Head = NonNullable<ErrorBody['error']['head']>;

/** An answer that is not a success, thrown anywhere below a route and put into the envelope in one place. */
export class Refusal extends Error {
  constructor(
    readonly status: number,
    readonly code: RefusalCode,
    message: string,
    readonly more: { fields?: Record<string, string>; head?: Head } = {},
  ) {
    super(message);
    this.name = 'Refusal';
  }
}

export const refuseInvalid = (
  fields: Record<string, string>,
  message = 'Some of what was sent cannot be used.',
) => new Refusal(400, 'invalid', message, { fields });

export const refuseNotSignedIn = (message = 'Sign in first, then try again.') =>
  new Refusal(401, 'not-signed-in', message);

export const refuseNotAllowed = (message: string) => new Refusal(403, 'not-allowed', message);

export const refuseNotFound = (what = 'There is nothing at this address, or it is not shared with you.') =>
  new Refusal(404, 'not-found', what);

export const refuseBadToken = (message: string) => new Refusal(400, 'bad-token', message);

export const refuseForgedRequest = () =>
  new Refusal(
    403,
    'bad-token',
    'The request did not carry the token of this page, so nothing was changed. Reload the page and try again.',
  );

export const refuseStaleSave = (head: Head) =>
  new Refusal(
    409,
    'conflict',
    `${head.author} saved version ${head.number} in the meantime, so nothing was saved. ` +
      'Save your state as a copy, or look at the newer version first.',
    { head },
  );

export const refuseTooLarge = (message: string) => new Refusal(413, 'too-large', message);

export const refuseTooMany = (minutes: number) =>
  new Refusal(
    429,
    'too-many-requests',
    `There were too many attempts. Wait ${minutes === 1 ? 'a minute' : `${minutes} minutes`}, then try again.`,
  );
